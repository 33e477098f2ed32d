/** One run: a series of its own, with so many lines. */
export interface Bench {
  readonly series: string;
  readonly total: number;
}

/** How long it took, in milliseconds. */
export const timed = async <T>(work: () => Promise<T> | T): Promise<{ value: T; ms: number }> => {
  const start = process.hrtime.bigint();
  const value = await work();
  return { value, ms: Number(process.hrtime.bigint() - start) / 1e6 };
};

export const perSecond = (count: number, ms: number): string =>
  `${Math.round((count * 1000) / ms).toLocaleString('en')} a second`;

export const say = (text: string): void => console.log(text);

/** A figure counts only where what was measured also holds. */
export const demand = (holds: boolean, what: string): void => {
  if (!holds) throw new Error(`Does not hold: ${what}`);
};
