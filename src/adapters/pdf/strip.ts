import { guardBands, type StripInput, stripScale } from '@/domain/decision/strip-scale';
import type { Written } from '@/domain/quantity/dimension';
import type { NoticeClause, NoticePosition } from '@/domain/verdict/notice/notice';
import type { Pen } from './pen';
import type { Style } from './typeface/typeface';

const LABEL: Style = { face: 'num', size: 14.5 };
const WORD: Style = { face: 'text', size: 14.5 };

/** Distances in pixels, of the strip on a sheet and of the one in a table's row. */
const LARGE = {
  bar: 6,
  barHeight: 11,
  base: 38,
  end: 66,
  post: 5,
  hatch: 15,
  cap: 13,
  diamond: 8.5,
  weight: 2,
};
const SMALL = {
  bar: 2,
  barHeight: 5,
  base: 13,
  end: 21,
  post: 3.5,
  hatch: 5,
  cap: 5,
  diamond: 4.5,
  weight: 1,
};

const number = (written: Written | undefined) =>
  written === undefined ? undefined : Number(written.text);

/** What places the ink; nothing is decided from it. */
export const stripOf = (clause: NoticeClause, position: NoticePosition): StripInput => {
  const { limits } = clause;
  const guard = limits?.guard;
  return {
    min: number(limits?.min),
    max: number(limits?.max),
    reading: number(position.value),
    uncertainty: number(position.uncertainty),
    guard: guard && { kind: guard.kind, width: Number(guard.width.text) },
  };
};

const hatch = (pen: Pen, from: number, to: number, base: number, half: number): void => {
  for (let x = from - 2 * half; x < to; x += 7) {
    const low = Math.max(x, from);
    const high = Math.min(x + 2 * half, to);
    if (high > low) pen.line(low, base + half - (low - x), high, base + half - (high - x), 1);
  }
};

const draw = (
  pen: Pen,
  input: StripInput,
  { x, y, width }: { readonly x: number; readonly y: number; readonly width: number },
  m: typeof LARGE,
): ReturnType<typeof stripScale> => {
  const scale = stripScale(input);
  const at = (value: number) => x + (scale.at(value) / 100) * width;
  const base = y + m.base;
  for (const [from, to] of guardBands(input)) hatch(pen, at(from), at(to), base, m.hatch);
  pen.line(x, base, x + width, base, m.weight);
  if (m === LARGE)
    for (const tick of scale.ticks) pen.line(at(tick), base - 6, at(tick), base + 6, 1.5);
  const limit = (value: number, from: number, to: number) => {
    pen.box(from, y + m.bar, to - from, m.barHeight);
    pen.line(at(value), y + m.bar, at(value), y + m.end, m.post);
  };
  if (input.min !== undefined) limit(input.min, x, at(input.min));
  if (input.max !== undefined) limit(input.max, at(input.max), x + width);
  const { reading, uncertainty = 0 } = input;
  if (reading === undefined) return scale;
  const reach = at(reading + uncertainty) - at(reading);
  if (uncertainty > 0) {
    pen.line(at(reading) - reach, base, at(reading) + reach, base, m.weight + 0.5);
    for (const end of [-reach, reach])
      pen.line(at(reading) + end, base - m.cap, at(reading) + end, base + m.cap, m.weight + 1);
  }
  const half =
    reach <= 0 ? m.diamond : Math.max(m.diamond * 0.35, Math.min(m.diamond, reach * 0.55));
  pen.path(`M0 ${-half}L${half} 0 0 ${half} ${-half} 0z`, at(reading), base, {});
  return scale;
};

export const drawSmallStrip = (pen: Pen, input: StripInput, x: number, y: number, width: number) =>
  void draw(pen, input, { x, y, width }, SMALL);

export const LARGE_STRIP_HEIGHT = 92;

/** The strip with its labels: limits and reading as written. */
export const drawLargeStrip = (
  pen: Pen,
  input: StripInput,
  labels: {
    readonly min?: string;
    readonly max?: string;
    readonly reading?: string;
    readonly outside: string;
  },
  place: { readonly x: number; readonly y: number; readonly width: number },
): void => {
  const { x, y, width } = place;
  const rightSide = input.max !== undefined;
  pen.text(rightSide ? x + width : x, y + 1, labels.outside, WORD, rightSide ? 'right' : 'left');
  const scale = draw(pen, input, place, LARGE);
  const taken: [number, number][] = [];
  const label = (value: number | undefined, text: string | undefined) => {
    if (value === undefined || text === undefined) return;
    const half = pen.width(text, LABEL) / 2;
    const centre = x + (scale.at(value) / 100) * width;
    const middle = Math.min(Math.max(centre, x + half), x + width - half);
    if (taken.some(([from, to]) => middle - half < to + 8 && middle + half > from - 8)) return;
    taken.push([middle - half, middle + half]);
    pen.text(middle, y + LARGE_STRIP_HEIGHT - 9, text, LABEL, 'center');
  };
  label(input.reading, labels.reading);
  label(input.max, labels.max);
  label(input.min, labels.min);
};
