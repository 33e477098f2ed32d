import type { TextRows } from './find-columns';

const COMMA = /^[+\-−]?\d+,\d+(\s*\D*)?$/;
const POINT = /^[+\-−]?\d*\.\d+(\s*\D*)?$/;

/** Whether this sheet writes its decimals with a comma: some cell does, and none with a point. */
export const hasDecimalCommas = (rows: TextRows): boolean => {
  const cells = rows.flat().map((cell) => cell.trim());
  return cells.some((cell) => COMMA.test(cell)) && !cells.some((cell) => POINT.test(cell));
};

/** `21,387` is 21.387 on such a sheet; anything else stays as it was written. */
export const withPoint = (text: string): string =>
  COMMA.test(text.trim()) ? text.replace(',', '.') : text;
