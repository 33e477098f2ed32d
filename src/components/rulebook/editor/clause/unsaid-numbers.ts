import type { Clause } from '@/domain/rulebook/clause';

/** `0.8420` as `0.842`, `2800` as it is: the same number is often written shorter in words. */
const plain = (text: string): string =>
  text.includes('.') ? text.replace(/0+$/, '').replace(/\.$/, '') : text;

const numbersIn = (words: string): ReadonlySet<string> =>
  new Set((words.replace(/(\d),(?=\d{3}\b)/g, '$1').match(/\d+(\.\d+)?|\.\d+/g) ?? []).map(plain));

/** Numbers of the limit that the clause's words leave out: they may have been changed on one side only. */
export const unsaidNumbers = ({ words, requirement }: Clause): readonly string[] => {
  if (requirement?.kind !== 'limit' || words.trim() === '') return [];
  const { min, max, nominal } = requirement;
  const said = numbersIn(words);
  return [min, max, nominal?.size, nominal?.plus, nominal?.minus].flatMap((written) =>
    written === undefined || written.text.trim() === '' || said.has(plain(written.text.trim()))
      ? []
      : [`${written.text} ${written.unit === '1' ? '' : written.unit}`.trim()],
  );
};
