/**
 * A value made by the public after the commitment: lap times, a scoreboard, dice thrown before
 * the grandstand. Numbers are whole and written in decimal (a lap of 21.417 s is 21417).
 */
export interface AnnouncedValue {
  /** What it is and where anybody can read it, precisely. */
  readonly name: string;
  /** What happens if it does not come into being. */
  readonly ifMissing: 'left-out' | 'substitute' | 'void';
  /** The name of the public value that takes its place; empty unless `ifMissing` is substitute. */
  readonly substitute: string;
}

export interface PublishedValue {
  readonly name: string;
  readonly source: 'announced' | 'substitute' | 'missing';
  /** Empty when missing. */
  readonly numbers: readonly string[];
}

export const isValueNumber = (text: string): boolean => /^(0|[1-9]\d{0,19})$/.test(text);

/**
 * The values as RFC 3797 section 4.1 writes sources of numbers: in the order announced, each
 * value's numbers ascending with a full stop after each, a slash after each value. A value that
 * is missing leaves its slash alone.
 */
export const valuesText = (values: readonly PublishedValue[]): string =>
  values
    .map(
      ({ numbers }) =>
        `${ascending(numbers)
          .map((n) => `${n}.`)
          .join('')}/`,
    )
    .join('');

const ascending = (numbers: readonly string[]): readonly string[] =>
  [...numbers].sort((a, b) => (BigInt(a) < BigInt(b) ? -1 : BigInt(a) > BigInt(b) ? 1 : 0));

/** What is wrong with the published values, held against those announced; undefined if nothing. */
export const findValueFault = (
  announced: readonly AnnouncedValue[],
  published: readonly PublishedValue[],
): string | undefined => {
  if (announced.length !== published.length) return 'Not as many values as were announced.';
  for (const [i, value] of published.entries()) {
    const fault = faultOf(announced[i], value);
    if (fault !== undefined) return `“${value.name}”: ${fault}`;
  }
  return undefined;
};

const faultOf = (
  announced: AnnouncedValue | undefined,
  { name, source, numbers }: PublishedValue,
): string | undefined => {
  if (announced?.name !== name) return 'this value was not announced at this place.';
  if (!numbers.every(isValueNumber)) return 'a number is not written in whole decimals.';
  if (source === 'missing') {
    if (numbers.length > 0) return 'it is said to be missing, yet has numbers.';
    return announced.ifMissing === 'left-out' ? undefined : 'it may not be left out.';
  }
  if (source === 'substitute' && announced.ifMissing !== 'substitute') {
    return 'no substitute was announced.';
  }
  return numbers.length === 0 ? 'it has no numbers.' : undefined;
};
