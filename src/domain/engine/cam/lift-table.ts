import type { Quantity } from '../../quantity/quantity';
import {
  add,
  compare,
  div,
  mul,
  type Rational,
  rational,
  sub,
  toNumber,
} from '../../quantity/rational';
import { asTyped, type Derived, shown, writtenOut } from '../derived';

export interface LiftPoint {
  /** Crankshaft degrees, rising down the table. */
  readonly degree: Quantity<'angle'>;
  readonly lift: Quantity<'length'>;
}

export interface LiftTable {
  readonly checkingLift: Quantity<'length'>;
  readonly points: readonly LiftPoint[];
  /** Standard uncertainties of one reading, in degrees and in metres. */
  readonly degreeUncertainty?: number | undefined;
  readonly liftUncertainty?: number | undefined;
}

export interface Duration extends Derived<'angle'> {
  readonly opens: Quantity<'angle'>;
  readonly closes: Quantity<'angle'>;
  /** Midway between the two flanks at the checking lift, not the place of the largest lift. */
  readonly centreline: Quantity<'angle'>;
  readonly largestLift: Quantity<'length'>;
  readonly warnings: readonly string[];
}

/** What is wrong with a table, and at which row. */
export interface TableFault {
  readonly row: number;
  readonly detail: string;
}

/** The first reason why no duration can be read from the table; `undefined` when it can. */
export function liftTableFault({ checkingLift, points }: LiftTable): TableFault | undefined {
  if (points.length < 3) return { row: 0, detail: 'A lift table needs three rows or more.' };
  for (const [row, { degree }] of points.entries()) {
    const before = points[row - 1];
    if (before !== undefined && compare(degree.value, before.degree.value) <= 0)
      return { row, detail: 'Degrees must rise from row to row.' };
  }
  const peak = peakRow(points);
  const above = (row: number) => compare(liftAt(points, row), checkingLift.value) > 0;
  if (!above(peak)) return { row: peak, detail: 'No reading lies above the checking lift.' };
  if (points.slice(0, peak).every((_, row) => above(row)))
    return { row: 0, detail: 'The opening flank does not start at or below the checking lift.' };
  if (points.slice(peak).every((_, i) => above(peak + i)))
    return {
      row: points.length - 1,
      detail: 'The closing flank does not end at or below the checking lift.',
    };
  return undefined;
}

/**
 * Duration and centreline at the checking lift, each flank interpolated in a straight line between the
 * two readings around it, counted outward from the largest lift. Throws on a table with a fault.
 */
export function durationAtLift(table: LiftTable): Duration {
  const fault = liftTableFault(table);
  if (fault !== undefined) throw new RangeError(fault.detail);
  const { checkingLift, points } = table;
  const peak = peakRow(points);
  const open = crossing(table, peak, -1);
  const close = crossing(table, peak, 1);
  const angle = (value: Rational) => writtenOut('angle', value, 'deg');
  const [opens, closes] = [angle(open.degree), angle(close.degree)];
  const value = angle(sub(close.degree, open.degree));
  const centreline = angle(div(add(open.degree, close.degree), rational(2n)));
  const contributions = [
    ...(open.uncertainty === undefined
      ? []
      : [{ name: 'opening flank', uncertainty: open.uncertainty }]),
    ...(close.uncertainty === undefined
      ? []
      : [{ name: 'closing flank', uncertainty: close.uncertainty }]),
  ];
  const lift = asTyped({ value: checkingLift });
  return {
    value,
    ...(contributions.length === 0
      ? {}
      : { standardUncertainty: Math.hypot(...contributions.map((c) => c.uncertainty)) }),
    contributions,
    datum: `crankshaft degrees between ${lift} rising and ${lift} falling, where the table was taken`,
    working: [
      `Opens through ${lift} at ${shown(opens, 2)}, ${open.between}`,
      `Closes through ${lift} at ${shown(closes, 2)}, ${close.between}`,
      `Duration ${shown(value, 2)}; centreline midway at ${shown(centreline, 2)}`,
    ],
    opens,
    closes,
    centreline,
    largestLift: points[peak]?.lift ?? checkingLift,
    warnings: recrosses(table, open.row, close.row)
      ? ['The lift rises above the checking lift again outside this lobe: check the table.']
      : [],
  };
}

const liftAt = (points: readonly LiftPoint[], row: number): Rational =>
  (points[row] as LiftPoint).lift.value;

function peakRow(points: readonly LiftPoint[]): number {
  let peak = 0;
  for (const row of points.keys()) {
    if (compare(liftAt(points, row), liftAt(points, peak)) > 0) peak = row;
  }
  return peak;
}

function crossing({ checkingLift, points, ...table }: LiftTable, peak: number, step: 1 | -1) {
  let row = peak;
  while (compare(liftAt(points, row), checkingLift.value) > 0) row += step;
  const [inner, outer] = [points[row - step] as LiftPoint, points[row] as LiftPoint];
  const slope = div(
    sub(inner.degree.value, outer.degree.value),
    sub(inner.lift.value, outer.lift.value),
  );
  const degree = add(outer.degree.value, mul(slope, sub(checkingLift.value, outer.lift.value)));
  const { degreeUncertainty, liftUncertainty } = table;
  const known = degreeUncertainty !== undefined || liftUncertainty !== undefined;
  const uncertainty = Math.hypot(degreeUncertainty ?? 0, (liftUncertainty ?? 0) * toNumber(slope));
  return {
    row,
    degree,
    uncertainty: known ? uncertainty : undefined,
    between: `between ${asTyped({ value: outer.degree })} (${asTyped({ value: outer.lift })}) and ${asTyped({ value: inner.degree })} (${asTyped({ value: inner.lift })})`,
  };
}

const recrosses = ({ checkingLift, points }: LiftTable, open: number, close: number): boolean =>
  points.some(
    ({ lift }, row) => (row < open || row > close) && compare(lift.value, checkingLift.value) > 0,
  );
