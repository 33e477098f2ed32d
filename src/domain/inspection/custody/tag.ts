/** A part taken into custody, as its tag says it. Instants are ISO 8601 in UTC. */
export interface HeldPart {
  readonly tag: string;
  readonly kind: 'held' | 'sample' | 'reference';
  readonly carNumber: string;
  readonly event: string;
  /** What it is: `Lifter, intake 3`. */
  readonly words: string;
  readonly placeOnEngine: string;
  readonly clause: string;
  readonly bag: string;
  readonly takenFrom: string;
  readonly takenBy: string;
  readonly takenAt: string;
  /** SHA-256 of its document, hexadecimal. */
  readonly hash: string;
}

export const PART_KINDS: Readonly<Record<HeldPart['kind'], string>> = {
  held: 'Held part',
  sample: 'Sample',
  reference: 'Reference part',
};

/** What may stand in a link's fragment as it is: letters of any script, figures, a few marks. */
const plain = (text: string): string =>
  text
    .trim()
    .replace(/\s+/g, '_')
    .replace(/[^\p{L}\p{N}._:,()+-]/gu, '-');

/**
 * The tag's code: a link whose fragment carries the essential text, so that it can be read off a
 * scanner without signal, and opens the part's page with it. The fragment never leaves the device.
 */
export const tagCode = (url: string, part: HeldPart): string => {
  const fields = [
    ['TAG', part.tag],
    ['CAR', part.carNumber],
    ['PART', [part.words, part.placeOnEngine].filter(Boolean).join(', ')],
    ['CLAUSE', part.clause],
    ['BAG', part.bag],
    ['TAKEN', part.takenAt.slice(0, 16)],
    ['BY', part.takenBy],
    ['EVENT', part.event],
    ['SHA256', part.hash],
  ] as const;
  const said = fields.filter(([, text]) => text.trim() !== '');
  return `${url}#${said.map(([name, text]) => `${name}=${plain(text)}`).join(';')}`;
};
