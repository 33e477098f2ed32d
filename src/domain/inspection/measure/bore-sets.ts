import { type Quantity, quantityOf } from '../../quantity/quantity';
import { fromStored } from '../../quantity/stored';
import type { BoreSheet, Length, PlaceReading, Temperatures } from '../../tappet/bore-sheet';
import { placesOf } from '../../tappet/places';
import type { JudgedReading } from '../capture/readings-that-count';
import { type LoggedTemperatures, positionKey } from '../capture/rows';
import { type Capture, findGauge, runsOf, standingRun, zerosOf } from './runs';

/** One set of readings of one bore and its lifter, ready to be measured. */
export interface BoreSet {
  readonly key: string;
  readonly set: number;
  readonly runId?: string | undefined;
  readonly sheet: BoreSheet;
  readonly foot: readonly Length[];
  /** The readings used, in taking order, and those that a later run took the place of. */
  readonly used: readonly JudgedReading[];
  readonly superseded: readonly JudgedReading[];
}

const lengthOf = (reading: JudgedReading): Length => fromStored(reading.row.value, 'length');

const temperaturesOf = (readings: readonly JudgedReading[]): Temperatures | undefined => {
  const logged = readings
    .map(({ row }) => row.temperatures)
    .find((row): row is LoggedTemperatures => row?.bore !== undefined && row.lifter !== undefined);
  if (logged?.bore === undefined || logged.lifter === undefined) return undefined;
  const read = (written: LoggedTemperatures['gauge']): Quantity<'temperature'> | undefined =>
    written && fromStored(written, 'temperature');
  return {
    bore: fromStored(logged.bore, 'temperature'),
    lifter: fromStored(logged.lifter, 'temperature'),
    setting: read(logged.setting),
    gauge: read(logged.gauge),
  };
};

/** A diameter for each height and axis of a part: repeats at one place are averaged, form is kept. */
const diametersByPlace = (readings: readonly JudgedReading[], unit: string): readonly Length[] =>
  placesOf(
    readings.map((reading) => ({
      depth: reading.row.depth,
      axis: reading.row.axis,
      value: lengthOf(reading).value,
    })),
  ).map(({ depth, axis, repeats, value }) => {
    const only = readings.find(({ row }) => row.depth === depth && row.axis === axis);
    return only !== undefined && repeats.length === 1
      ? lengthOf(only)
      : quantityOf('length', value, unit);
  });

const sheetOf = (
  capture: Capture,
  bore: readonly JudgedReading[],
  lifter: readonly JudgedReading[],
): BoreSheet => {
  const [first] = bore;
  const comparative = first?.row.method === 'comparative';
  const { opening, zeros, order } = zerosOf(capture, first?.row.zeroRunId);
  const places = bore.map(
    (reading): PlaceReading => ({
      depth: reading.row.depth,
      axis: reading.row.axis,
      reading: lengthOf(reading),
      order: order.get(reading.row.id),
    }),
  );
  return {
    unit: capture.unit,
    method: comparative ? 'comparative' : 'absolute',
    lifter: diametersByPlace(lifter, capture.unit),
    bore: places,
    zeroSize:
      opening?.zeroedOn === 'ring' && opening.size !== undefined
        ? fromStored(opening.size, 'length')
        : undefined,
    zeros: comparative && opening !== undefined ? zeros : undefined,
    gauge: findGauge(capture, first?.row.gaugeId),
    lifterGauge: findGauge(capture, lifter[0]?.row.gaugeId),
    settingRing: findGauge(capture, opening?.ringId),
    temperatures: temperaturesOf([...bore, ...lifter]),
    materials: capture.materials,
    repeatability: capture.repeatability,
    window: capture.window,
    fitRatio: capture.fitRatio,
  };
};

/**
 * The sets of one bore. Each set stands on the last run whose closing zero held; a set without
 * lifter readings of its own takes those of the set before it.
 */
export const boreSetsOf = (capture: Capture, key: string): readonly BoreSet[] => {
  const here = capture.judged.filter(
    ({ row, place, state }) =>
      state === 'counts' && row.referencePart === undefined && positionKey(place, 'bore') === key,
  );
  const of = (quantity: string, set: number) =>
    here.filter(({ row }) => row.quantity === quantity && row.set === set);
  const numbers = [...new Set(here.map(({ row }) => row.set))].sort((a, b) => a - b);
  const sets: BoreSet[] = [];
  let lifter: readonly JudgedReading[] = [];
  let feet: readonly JudgedReading[] = [];
  for (const set of numbers) {
    const own = of('lifter-body-diameter', set);
    const ownFeet = of('foot-diameter', set);
    lifter = own.length > 0 ? own : lifter;
    feet = ownFeet.length > 0 ? ownFeet : feet;
    const all = of('tappet-bore-diameter', set);
    const bore = standingRun(capture, runsOf(all));
    const used = [...bore, ...lifter, ...feet];
    if (used.length === 0) continue;
    sets.push({
      key,
      set,
      runId: bore[0]?.row.zeroRunId,
      sheet: sheetOf(capture, bore, lifter),
      foot: diametersByPlace(feet, capture.unit),
      used,
      superseded: all.filter((reading) => !bore.includes(reading)),
    });
  }
  return sets;
};
