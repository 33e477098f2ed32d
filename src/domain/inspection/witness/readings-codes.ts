import type { MandatoryReadings } from './mandatory-readings';

/** What stands in every code, so that parts find together. */
export interface CodeHead {
  readonly carNumber: string;
  readonly className: string;
  readonly event: string;
  /** Local time. */
  readonly at: string;
  readonly inspector: string;
  /** Heads of the hashes of the rules and of the inspection's chain. */
  readonly rules: string;
  readonly chain: string;
}

/** Bytes of text a code carries: version 20 at level M, which a phone reads off a tablet's screen. */
export const CODE_BYTES = 660;

const passWord = (pass: boolean | null): string =>
  pass === null ? 'no finding' : pass ? 'pass' : 'FAIL';

/** The readings as plain lines; numbers as they were read, with a plain minus. */
export const readingsLines = (head: CodeHead, readings: MandatoryReadings): readonly string[] => [
  `${head.className}, ${head.event}, ${head.at}`,
  `Inspector ${head.inspector}. Rules ${head.rules}`,
  ...readings.groups.flatMap(({ label, unit, gauge, zero, places, rows }) => [
    `${label}, ${unit}, ${gauge}${zero === '' ? '' : `, ${zero}`}`,
    ...(places.some((place) => place !== '') ? [`at ${places.join('; ')}`] : []),
    ...rows.map(({ position, values }) => `${position}: ${values.join(' ')}`),
  ]),
  ...readings.checks.map(({ subject, answers }) => `${subject}: ${answers.join('; ')}`),
  ...readings.findings.map(
    ({ clause, heading, pass }) => `${clause} ${heading}: ${passWord(pass)}`,
  ),
];

const bytesOf = (text: string): number => new TextEncoder().encode(text).length;

/** A line that no code could hold, in pieces that each can. */
const pieces = (line: string, most: number): readonly string[] => {
  const parts: string[] = [''];
  for (const letter of line) {
    const last = parts.at(-1) ?? '';
    if (bytesOf(last + letter) > most) parts.push(letter);
    else parts[parts.length - 1] = last + letter;
  }
  return parts;
};

/**
 * The lines cut into as few codes as hold them, each with its number, the car and the head of the
 * chain on top: `Readings 1/3, car 12J, chain 9f3a12cd`.
 */
export const splitIntoCodes = (
  lines: readonly string[],
  { carNumber, chain }: Pick<CodeHead, 'carNumber' | 'chain'>,
  most = CODE_BYTES,
): readonly string[] => {
  const title = (part: string, of: string) =>
    `Readings ${part}/${of}, car ${carNumber}, chain ${chain}`;
  const room = most - bytesOf(title('99', '99')) - 1;
  const codes: string[] = [];
  let current = '';
  for (const piece of lines.flatMap((line) => pieces(line, room))) {
    const longer = current === '' ? piece : `${current}\n${piece}`;
    if (bytesOf(longer) <= room) current = longer;
    else {
      codes.push(current);
      current = piece;
    }
  }
  codes.push(current);
  return codes.map((text, at) => `${title(String(at + 1), String(codes.length))}\n${text}`);
};

/** The lines out of codes again, in whatever order they were read; nothing while one is missing. */
export const joinCodes = (codes: readonly string[]): readonly string[] | undefined => {
  const parts = new Map<number, string>();
  let of = 0;
  for (const code of codes) {
    const found = /^Readings (\d+)\/(\d+), [^\n]*\n/.exec(code);
    if (found === null) return undefined;
    of = Number(found[2]);
    parts.set(Number(found[1]), code.slice(found[0].length));
  }
  const texts = Array.from({ length: of }, (_, at) => parts.get(at + 1));
  return of === 0 || texts.includes(undefined) ? undefined : texts.join('\n').split('\n');
};
