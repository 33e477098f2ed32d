import type { SheetForm } from '../../rulebook/form/form';
import type { ColumnMeaning } from '../sheet/header/column-meaning';
import { readHeader, unitIn } from '../sheet/header/read-header';
import { findValve } from '../sheet/positions';
import { findDegree } from './cam-place';

/** An angle and a number beside it. */
export const isDegreeRow = (row: readonly string[]): boolean =>
  row.some((cell) => findDegree(cell) !== undefined) &&
  row.filter((cell) => /^\s*[+\-−]?[.,]?\d/.test(cell)).length > 1;

const ANGLE = /\b(deg|degs|degrees?|angle|crank|crankshaft|rotation|grad|winkel)\b|°/i;

/**
 * What a column of a cam table holds by its heading: the angle, or the lift of the lobe it names. A lift
 * of nobody knows which lobe is not taken, and asked about.
 */
export const degreeMeaning = (
  header: string,
  holdsAngles: boolean,
  form: SheetForm,
): ColumnMeaning => {
  if (holdsAngles && ANGLE.test(header)) return { kind: 'position' };
  const [column] = form.columns;
  const valve = header
    .toLowerCase()
    .split(/[^a-z]+/)
    .map((word) => (word === 'in' ? undefined : findValve(word)))
    .find((found) => found !== undefined);
  if (column === undefined || valve === undefined) return { kind: 'not-taken' };
  const said = readHeader(header, form);
  const unit =
    said.kind === 'reading' ? said.unit : (unitIn(header, column.quantity) ?? column.unit);
  return { kind: 'reading', quantity: column.quantity, unit, depth: '', axis: '', valve };
};
