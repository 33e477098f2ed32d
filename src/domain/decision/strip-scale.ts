/** Plain numbers: this places ink on a line and decides nothing. */
export interface StripInput {
  readonly min?: number | undefined;
  readonly max?: number | undefined;
  readonly reading?: number | undefined;
  readonly uncertainty?: number | undefined;
  readonly guard?: Guard | undefined;
}

/** The band beside each limit: inside it for guarded acceptance, beyond it for guarded rejection. */
export interface Guard {
  readonly kind: 'acceptance' | 'rejection';
  readonly width: number;
}

export interface Scale {
  readonly from: number;
  readonly to: number;
  readonly ticks: readonly number[];
  /** Place of a value on the line, 0 to 100. */
  readonly at: (value: number) => number;
}

const niceStep = (rough: number): number => {
  const power = 10 ** Math.floor(Math.log10(rough));
  const lead = rough / power;
  return (lead <= 1 ? 1 : lead <= 2 ? 2 : lead <= 5 ? 5 : 10) * power;
};

/** Guard bands as [from, to]. */
export const guardBands = ({
  min,
  max,
  guard,
}: StripInput): readonly (readonly [number, number])[] => {
  if (guard === undefined || guard.width <= 0) return [];
  const inward = guard.kind === 'acceptance' ? guard.width : -guard.width;
  const band = (limit: number, other: number): readonly [number, number] =>
    limit < other ? [limit, other] : [other, limit];
  return [
    ...(min === undefined ? [] : [band(min, min + inward)]),
    ...(max === undefined ? [] : [band(max, max - inward)]),
  ];
};

/**
 * A scale that shows every limit, the guard bands and the whole of reading ± U, with the forbidden
 * side of each limit wide enough to be seen. Ends lie on ticks; a line of magnitudes starts at zero
 * rather than below it.
 */
export const stripScale = (input: StripInput): Scale => {
  const { min, max, reading, uncertainty = 0 } = input;
  const points = [
    ...(min === undefined ? [] : [min]),
    ...(max === undefined ? [] : [max]),
    ...(reading === undefined ? [] : [reading - uncertainty, reading + uncertainty]),
    ...guardBands(input).flat(),
  ].filter(Number.isFinite);
  const low = points.length === 0 ? 0 : Math.min(...points);
  const high = points.length === 0 ? 1 : Math.max(...points);
  const span = high > low ? high - low : Math.abs(high) * 0.1 || 1;
  const band = min !== undefined && max !== undefined ? max - min : span;
  const below = Math.min(low - span * 0.12, min === undefined ? low : min - band * 0.45);
  const above = Math.max(high + span * 0.12, max === undefined ? high : max + band * 0.3);
  const top = min !== undefined && max !== undefined ? Math.max(above, max + band * 0.45) : above;
  const bottom = below < 0 && low >= 0 ? 0 : below;
  const step = niceStep((top - bottom) / 16);
  const first = Math.floor(bottom / step + 1e-9);
  const last = Math.ceil(top / step - 1e-9);
  const from = first * step;
  const to = last * step;
  const at = (value: number) => Math.round(((value - from) / (to - from)) * 1e4) / 100;
  const ticks = Array.from({ length: last - first + 1 }, (_, index) => from + index * step);
  return { from, to, ticks, at };
};
