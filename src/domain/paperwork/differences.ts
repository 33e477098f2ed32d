import { writtenWords } from '../rulebook/describe';
import { getQuantityEntry } from '../rulebook/quantity-catalogue';
import type { DeclaredAnswer, DeclaredReading, PaperworkDocument } from './document';

/** What one version says and the other does not; nothing where it was or became empty. */
export interface PaperworkDifference {
  /** The question's or sheet's subject, or a photograph's. */
  readonly item: string;
  /** Where within the item: `3 exhaust, tappet bore diameter`; empty for an answer of the whole engine. */
  readonly place: string;
  readonly before?: string | undefined;
  readonly now?: string | undefined;
}

/** What differences are looked for in. */
export type Compared = Pick<PaperworkDocument, 'answers' | 'sheets' | 'photographs' | 'files'>;

type Said = ReadonlyMap<
  string,
  Omit<PaperworkDifference, 'before' | 'now'> & { readonly words: string }
>;

const answerKey = ({ subject, position }: DeclaredAnswer): string =>
  `answer|${subject}|${position}`;

const readingKey = (subject: string, reading: DeclaredReading): string =>
  ['reading', subject, reading.position, reading.quantity, reading.depth, reading.axis].join('|');

const placeOf = ({ position, quantity, depth, axis }: DeclaredReading): string => {
  const label = getQuantityEntry(quantity).label.toLowerCase();
  return [`${position},`, label, depth, axis].filter((part) => part !== '').join(' ');
};

const said = (paper: Compared): Said =>
  new Map([
    ...paper.answers.map((answer) => {
      const { subject: item, position } = answer;
      const place = position === 'engine' || position === 'car' ? '' : position;
      const words = 'written' in answer ? writtenWords(answer.written) : answer.value;
      return [answerKey(answer), { item, place, words }] as const;
    }),
    ...paper.sheets.flatMap((sheet) =>
      sheet.readings.map((reading) => {
        const words = writtenWords(reading.value);
        return [
          readingKey(sheet.subject, reading),
          { item: sheet.subject, place: placeOf(reading), words },
        ] as const;
      }),
    ),
    // Files are told apart by their bytes: the same picture under another name is no change.
    ...[...paper.photographs, ...paper.files].map(
      ({ item, name, sha256 }) =>
        [`file|${item}|${sha256}`, { item, place: 'file', words: name }] as const,
    ),
  ]);

/** What changed from one version to the next, in the order of the newer one; what is gone comes last. */
export const paperworkDifferences = (
  before: Compared,
  now: Compared,
): readonly PaperworkDifference[] => {
  const old = said(before);
  const fresh = said(now);
  const changed = [...fresh].flatMap(([key, { item, place, words }]): PaperworkDifference[] => {
    const was = old.get(key)?.words;
    return was === words || (was !== undefined && key.startsWith('file|'))
      ? []
      : [{ item, place, before: was, now: words }];
  });
  const gone = [...old].flatMap(([key, { item, place, words }]): PaperworkDifference[] =>
    fresh.has(key) ? [] : [{ item, place, before: words }],
  );
  return [...changed, ...gone];
};
