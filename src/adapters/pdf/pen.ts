import { type PDFPage, rgb } from 'pdf-lib';
import type { Style, Typesetter } from './typeface/typeface';

/** A4 in the CSS pixels that the sheet was drawn in: 96 to the inch, from the top left. */
export const SHEET = { width: 794, height: 1123, left: 50, content: 176, right: 744 } as const;
export const POINTS = 0.75;
const BLACK = rgb(0, 0, 0);
const WHITE = rgb(1, 1, 1);

export type Align = 'left' | 'right' | 'center';

/** Draws in pixels from the top left; black only. */
export interface Pen {
  readonly width: (text: string, style: Style) => number;
  readonly text: (x: number, baseline: number, text: string, style: Style, align?: Align) => void;
  readonly line: (x1: number, y1: number, x2: number, y2: number, weight: number) => void;
  readonly box: (x: number, y: number, width: number, height: number) => void;
  /** An SVG path moved to x, y; filled, or stroked with a weight. */
  readonly path: (
    path: string,
    x: number,
    y: number,
    how: {
      readonly scale?: number;
      readonly weight?: number;
      readonly dash?: readonly number[];
      readonly white?: boolean;
    },
  ) => void;
}

const heightOf = (page: PDFPage): number => page.getHeight();

export const penOn = (page: PDFPage, type: Typesetter): Pen => {
  const flip = (y: number) => heightOf(page) - y * POINTS;
  return {
    width: type.width,
    text: (x, baseline, text, style, align = 'left') => {
      const moved = align === 'left' ? 0 : type.width(text, style) / (align === 'right' ? 1 : 2);
      type.draw(page, text, {
        x: (x - moved) * POINTS,
        y: flip(baseline),
        style,
        scale: POINTS,
        ink: style.white === true ? WHITE : BLACK,
      });
    },
    line: (x1, y1, x2, y2, weight) =>
      page.drawLine({
        start: { x: x1 * POINTS, y: flip(y1) },
        end: { x: x2 * POINTS, y: flip(y2) },
        thickness: weight * POINTS,
        color: BLACK,
      }),
    box: (x, y, width, height) =>
      page.drawRectangle({
        x: x * POINTS,
        y: flip(y + height),
        width: width * POINTS,
        height: height * POINTS,
        color: BLACK,
      }),
    path: (path, x, y, { scale = 1, weight, dash, white = false }) => {
      const ink = white ? WHITE : BLACK;
      page.drawSvgPath(path, {
        x: x * POINTS,
        y: flip(y),
        scale: scale * POINTS,
        ...(weight === undefined ? { color: ink } : { borderColor: ink, borderWidth: weight }),
        ...(dash === undefined ? {} : { borderDashArray: [...dash] }),
      });
    },
  };
};
