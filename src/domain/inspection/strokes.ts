import { canonicalJson } from '../ledger/canonical';

/** The pad's field in whole units; every point lies on it. */
export const PAD = { width: 1000, height: 300 } as const;
export const MOST_STROKES = 60;
export const MOST_POINTS = 2000;

const POINT = /^(0|[1-9]\d{0,3}),(0|[1-9]\d{0,2})$/;

const isStroke = (text: string): boolean =>
  text.split(' ').every((point) => {
    const [, x, y] = POINT.exec(point) ?? [];
    return x !== undefined && Number(x) <= PAD.width && Number(y) <= PAD.height;
  });

/**
 * Whether these are strokes as the pad makes them: each a list of points `x,y` in whole units, one
 * space between two; neither too many strokes nor too many points in all.
 */
export const areStrokes = (strokes: readonly string[]): boolean =>
  strokes.length > 0 &&
  strokes.length <= MOST_STROKES &&
  strokes.reduce((sum, stroke) => sum + stroke.split(' ').length, 0) <= MOST_POINTS &&
  strokes.every(isStroke);

/** One more point of a stroke; the same text where the pen has not left the last whole unit. */
export const withPoint = (stroke: string, x: number, y: number): string => {
  const on = (value: number, most: number) => Math.min(most, Math.max(0, Math.round(value)));
  const point = `${on(x, PAD.width)},${on(y, PAD.height)}`;
  if (stroke === '') return point;
  return stroke.endsWith(` ${point}`) || stroke === point ? stroke : `${stroke} ${point}`;
};

/** An SVG path through a stroke's points; a dot is drawn as a line of no length. */
export const strokePath = (stroke: string): string => {
  const points = stroke.split(' ');
  return `M${points.join('L')}${points.length === 1 ? 'h0' : ''}`;
};

/** What a signature's line commits to under the role `strokes`. */
export const strokesDocument = (reportHash: string, strokes: readonly string[]): string =>
  canonicalJson({
    document: 'tagwire/strokes',
    version: '1',
    report: reportHash,
    width: String(PAD.width),
    height: String(PAD.height),
    strokes: [...strokes],
  });

/** The strokes that such a document holds; nothing where it is none. */
export const readStrokes = (document: string): readonly string[] | undefined => {
  try {
    const read: unknown = JSON.parse(document);
    const strokes = (read as { readonly strokes?: unknown } | null)?.strokes;
    return Array.isArray(strokes) &&
      strokes.every((one): one is string => typeof one === 'string') &&
      areStrokes(strokes)
      ? strokes
      : undefined;
  } catch {
    return undefined;
  }
};
