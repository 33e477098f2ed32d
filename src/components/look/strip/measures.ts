export type StripSize = 'table' | 'measuring' | 'print';

/** Distances in px; `nominal` is the width the strip is drawn for, its true width follows its column. */
export interface Measures {
  readonly height: number;
  readonly nominal: number;
  /** Widest the strip is expected to become: hatching is drawn that far. */
  readonly widest: number;
  readonly font: number;
  readonly wordY: number;
  readonly barY: number;
  readonly barHeight: number;
  readonly baseY: number;
  readonly postEnd: number;
  readonly post: number;
  readonly labelY: number;
  readonly hatch: number;
  readonly tick: number;
  readonly cap: number;
  readonly capWidth: number;
  readonly whisker: number;
  readonly diamond: number;
}

export const measures: Readonly<Record<StripSize, Measures>> = {
  measuring: {
    height: 92,
    nominal: 388,
    widest: 760,
    font: 16,
    wordY: 11,
    barY: 15,
    barHeight: 11,
    baseY: 48,
    postEnd: 77,
    post: 5,
    labelY: 91,
    hatch: 15,
    tick: 6,
    cap: 12,
    capWidth: 5,
    whisker: 5,
    diamond: 12,
  },
  print: {
    height: 98,
    nominal: 566,
    widest: 760,
    font: 15,
    wordY: 11,
    barY: 17,
    barHeight: 11,
    baseY: 49,
    postEnd: 77,
    post: 5,
    labelY: 94,
    hatch: 15,
    tick: 6,
    cap: 13,
    capWidth: 3.5,
    whisker: 2.5,
    diamond: 8.5,
  },
  table: {
    height: 22,
    nominal: 136,
    widest: 170,
    font: 0,
    wordY: 0,
    barY: 1.5,
    barHeight: 5,
    baseY: 12.5,
    postEnd: 21,
    post: 3.5,
    labelY: 0,
    hatch: 5,
    tick: 0,
    cap: 5,
    capWidth: 2,
    whisker: 2,
    diamond: 4.5,
  },
};

/** The narrowest column a labelled strip is expected in, in px. */
export const NARROWEST = 328;

/** Width of a label in px: B612's digits are 0.65 em wide, its letters less. */
export const labelWidth = (label: string, m: Measures): number => label.length * m.font * 0.62;

/** Half-width of the diamond: smaller than U on the line, else the whiskers vanish behind it. */
export const diamondHalf = (m: Measures, uncertaintyPx: number): number =>
  uncertaintyPx <= 0 ? m.diamond : Math.max(3, Math.min(m.diamond, uncertaintyPx * 0.55));

/** Path of 45° hatch lines, pitch 7 px across the lines, over `width` × `height`. */
export const hatchPath = (width: number, height: number): string => {
  const pitch = 7 * Math.SQRT2;
  const lines = Math.ceil((width + height) / pitch);
  return Array.from({ length: lines }, (_, index) => {
    const x = Math.round((index * pitch + 3) * 10) / 10;
    return `M${x - height} ${height}l${height}-${height}`;
  }).join('');
};
