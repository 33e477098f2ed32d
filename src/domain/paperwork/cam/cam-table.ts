import {
  type Duration,
  durationAtLift,
  type LiftPoint,
  liftTableFault,
} from '../../engine/cam/lift-table';
import type { Written } from '../../quantity/dimension';
import { parseQuantity } from '../../quantity/parse';
import type { Quantity } from '../../quantity/quantity';
import { compare } from '../../quantity/rational';
import { fromStored } from '../../quantity/stored';
import type { QuantityName } from '../../rulebook/quantity-catalogue';
import type { RulesInForce } from '../../rulebook/rules-in-force';
import type { Valve } from '../../tappet/layout/bore-layout';
import { degreeAt, LOBES, lobeOf } from './cam-place';

/** One lift of a cam table, as written. */
export interface LiftReading {
  readonly position: string;
  readonly quantity: QuantityName;
  readonly axis: string;
  readonly value: Written;
}

/** What a table says of one lobe. */
export interface Lobe {
  readonly lobe: Valve;
  readonly quantity: QuantityName;
  readonly points: readonly LiftPoint[];
  readonly largest: LiftPoint;
  /** At the lift the rules take it at; nothing where they name none, or the table does not reach it. */
  readonly duration?: Duration | undefined;
  /** Why there is none. */
  readonly noDuration?: string | undefined;
}

const LENGTH = /(?:^|[^\d.])((?:\d+\.\d*|\.?\d+)\s*(?:in|mm|thou)\b)/g;

const lengthIn = (words: string): Quantity<'length'> | undefined => {
  const [only, ...more] = [...words.matchAll(LENGTH)].map(([, text = '']) => text);
  if (only === undefined || more.length > 0) return undefined;
  const read = parseQuantity(only, { dimension: 'length' });
  return read.ok ? read.value : undefined;
};

/** The lift between which the rules take the duration: where every such limit names one, the same one. */
export const checkingLiftIn = (
  rules: Pick<RulesInForce, 'clauses'> | undefined,
): Quantity<'length'> | undefined => {
  const named = (rules?.clauses ?? []).flatMap(({ requirement }) =>
    requirement?.kind === 'limit' && requirement.quantity === 'duration'
      ? [lengthIn(requirement.datum ?? '')]
      : [],
  );
  const [first] = named;
  return first !== undefined &&
    named.every((one) => one !== undefined && compare(one.value, first.value) === 0)
    ? first
    : undefined;
};

const pointOf = ({ position, value }: LiftReading): LiftPoint => ({
  degree: degreeAt(position),
  lift: fromStored(value, 'length'),
});

/** Each lobe of a table that has a lift, in rising order of degrees; readings of other sheets are left out. */
export const lobesOf = (
  readings: readonly LiftReading[],
  checkingLift?: Quantity<'length'>,
): readonly Lobe[] =>
  LOBES.flatMap((lobe): readonly Lobe[] => {
    const own = readings.filter((reading) => lobeOf(reading) === lobe);
    const points = own.map(pointOf).toSorted((a, b) => compare(a.degree.value, b.degree.value));
    const largest = points.reduce<LiftPoint | undefined>(
      (most, point) =>
        most === undefined || compare(point.lift.value, most.lift.value) > 0 ? point : most,
      undefined,
    );
    if (largest === undefined || own[0] === undefined) return [];
    const said = { lobe, quantity: own[0].quantity, points, largest };
    if (checkingLift === undefined) return [said];
    const table = { checkingLift, points };
    const fault = liftTableFault(table);
    return [
      fault === undefined
        ? { ...said, duration: durationAtLift(table) }
        : { ...said, noDuration: fault.detail },
    ];
  });
