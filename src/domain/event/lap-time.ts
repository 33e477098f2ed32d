import { compare, type Rational, rational } from '../quantity/rational';

/**
 * Exact seconds of a lap time as people write it: `17.482`, `17,482`, `1:02.300`. Nothing where it is
 * no lap time. The text itself is what is kept.
 */
export const findLapSeconds = (text: string): Rational | undefined => {
  const [, minutes, seconds = '', , decimals = ''] =
    /^(?:(\d{1,3}):(?=[0-5]\d(?:\D|$)))?(\d{1,4})([.,](\d{1,6}))?$/.exec(text.trim()) ?? [];
  if (seconds === '') return undefined;
  const scale = 10n ** BigInt(decimals.length);
  const whole = BigInt(minutes ?? '0') * 60n + BigInt(seconds);
  const exact = whole * scale + BigInt(decimals === '' ? '0' : decimals);
  return exact === 0n ? undefined : rational(exact, scale);
};

/** The lap times of one cell, in order: parted by blanks, semicolons or strokes. */
export const lapsIn = (cell: string): readonly string[] =>
  cell.split(/[\s;|]+/).filter((part) => part !== '');

/** The fastest of lap times, as it was written; of equal ones the first. */
export const fastestLap = (laps: readonly string[]): string | undefined => {
  let best: { readonly text: string; readonly seconds: Rational } | undefined;
  for (const text of laps) {
    const seconds = findLapSeconds(text);
    if (seconds === undefined) continue;
    if (best === undefined || compare(seconds, best.seconds) < 0) best = { text, seconds };
  }
  return best?.text;
};
