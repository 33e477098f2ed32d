/**
 * The decision rules once more, by another road: whole picometres only, no rational, no unit, no
 * shared code. Values and limits are whole multiples of 1e-7 in (2,540 pm); quantiles are constants.
 */
export interface Case {
  /** In 1e-7 in. */
  readonly value: number;
  readonly min: number | null;
  readonly max: number | null;
  /** Standard uncertainty in 1e-7 in, a whole number. */
  readonly u: number;
  readonly rule: 'simple' | 'guarded-acceptance' | 'guarded-rejection';
  readonly guardFactor: number | null;
  /** Decimals of an inch to which values are rounded first; null: absolute. */
  readonly decimals: 3 | 4 | 5 | null;
}

export interface Told {
  readonly assessment: 'within' | 'outside' | 'too-close';
  readonly complies: boolean | null;
  readonly fit: boolean;
  readonly fourState: 'pass' | 'conditional-pass' | 'conditional-fail' | 'fail';
}

const PM = 2540;
const Z_TWO_SIDED_95 = 1.959963984540054;
const Z_ONE_SIDED_95 = 1.6448536269514722;

// Twice the picometres, so that half a rounding step stays whole.
const scaled = (tenMillionths: number): number => 2 * PM * tenMillionths;
const widthUp = (pm: number): number => 2 * Math.ceil(pm - 1e-6);

interface Edge {
  readonly at: number;
  readonly inclusive: boolean;
}

const edge = (limit: number, decimals: Case['decimals'], side: 1 | -1): Edge => {
  if (decimals === null) return { at: scaled(limit), inclusive: true };
  const step = 10 ** (7 - decimals);
  const whole = side === 1 ? Math.floor(limit / step) : Math.ceil(limit / step);
  return { at: scaled(whole * step) + side * PM * step, inclusive: whole % 2 === 0 };
};

export const oracle = (one: Case): Told => {
  const v = scaled(one.value);
  const U = widthUp(Z_TWO_SIDED_95 * one.u * PM);
  const g =
    one.rule === 'simple'
      ? 0
      : one.guardFactor === null
        ? widthUp(Z_ONE_SIDED_95 * one.u * PM)
        : widthUp(one.guardFactor * Z_TWO_SIDED_95 * one.u * PM);
  const high = one.max === null ? null : edge(one.max, one.decimals, 1);
  const low = one.min === null ? null : edge(one.min, one.decimals, -1);
  const insideBy = (margin: number): boolean => {
    const under =
      high === null || v + margin < high.at || (v + margin === high.at && high.inclusive);
    const over = low === null || v - margin > low.at || (v - margin === low.at && low.inclusive);
    return under && over;
  };
  const touches = (at: number): boolean => Math.abs(v - at) <= U;
  const close = U > 0 && ((high !== null && touches(high.at)) || (low !== null && touches(low.at)));
  const fit =
    one.min === null || one.max === null || U === 0 || scaled(one.max - one.min) >= 2 * 2 * U;
  const excused = insideBy(-g);
  return {
    assessment: close ? 'too-close' : insideBy(0) ? 'within' : 'outside',
    fit,
    complies:
      one.rule === 'guarded-rejection' ? (excused ? (fit ? true : null) : false) : insideBy(g),
    fourState: insideBy(0)
      ? insideBy(U)
        ? 'pass'
        : 'conditional-pass'
      : insideBy(-U)
        ? 'conditional-fail'
        : 'fail',
  };
};
