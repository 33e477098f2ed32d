import { readFileSync } from 'node:fs';

export const page = readFileSync(
  new URL('../../../docs/record-format.md', import.meta.url),
  'utf8',
);

/** The fenced blocks of the page whose first word is `word`, by the name that follows it. */
export const blocksOf = (word: string): ReadonlyMap<string, string> =>
  new Map(
    [...page.matchAll(/^```(\w+) (.+)\n([\s\S]*?)\n```$/gm)]
      .filter(([, kind]) => kind === word)
      .map(([, , name = '', content = '']) => [name, content]),
  );
