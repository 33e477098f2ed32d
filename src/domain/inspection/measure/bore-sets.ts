import { divisionOf } from '../../measurement/gauge-figures';
import type { Quantity } from '../../quantity/quantity';
import { fromStored } from '../../quantity/stored';
import type { BoreSheet, Length, PlaceReading, Temperatures, Zeros } from '../../tappet/bore-sheet';
import { mustRedo } from '../../tappet/redo';
import { DIAL } from '../../tappet/sheet-budget';
import { type GaugeRecord, gaugeOf } from '../capture/gauge-record';
import type { JudgedReading } from '../capture/readings-that-count';
import { inTakingOrder, type LoggedTemperatures, positionKey, type ZeroRow } from '../capture/rows';

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

export interface Capture {
  /** All readings with what became of them: struck ones took their turn in a run. */
  readonly judged: readonly JudgedReading[];
  readonly zeros: readonly ZeroRow[];
  readonly gauges: readonly GaugeRecord[];
  /** Unit of the results. */
  readonly unit: string;
  /** Width of the permitted zone of the clearance, where a clause gives one. */
  readonly window?: Length | undefined;
  readonly materials?: BoreSheet['materials'];
  readonly repeatability?: BoreSheet['repeatability'];
}

const lengthOf = (reading: JudgedReading): Length => fromStored(reading.row.value, 'length');

const findGauge = (capture: Capture, id: string | undefined) => {
  const record = capture.gauges.find((gauge) => gauge.id === id);
  return record && gaugeOf(record, 'length');
};

const zerosOf = (capture: Capture, runId: string | undefined) => {
  const rows = inTakingOrder(capture.zeros).filter(
    (row) => row.runId === runId && row.standing === 'accepted',
  );
  const opening = rows.find((row) => row.kind === 'opening');
  const closing = rows.findLast((row) => row.kind === 'closing');
  const run = capture.judged.filter(
    ({ row, state }) =>
      row.zeroRunId === runId && state !== 'received' && row.method === 'comparative',
  );
  const zeros: Zeros = {
    opening: opening && fromStored(opening.reading, 'length'),
    closing: closing && fromStored(closing.reading, 'length'),
    readingsInRun: run.length,
  };
  return { opening, zeros, order: new Map(run.map(({ row }, i) => [row.id, i + 1])) };
};

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

/** Readings of one method and run, in the order in which the runs began. */
const runsOf = (readings: readonly JudgedReading[]): readonly (readonly JudgedReading[])[] => {
  const runs = new Map<string, JudgedReading[]>();
  for (const reading of readings) {
    const run = `${reading.row.method} ${reading.row.zeroRunId ?? ''}`;
    runs.set(run, [...(runs.get(run) ?? []), reading]);
  }
  return [...runs.values()];
};

/** The last run whose closing zero held; the last run of all where none did. */
const standingRun = (capture: Capture, runs: readonly (readonly JudgedReading[])[]) => {
  const failed = (run: readonly JudgedReading[]) => {
    const [first] = run;
    if (first?.row.method !== 'comparative') return false;
    const division = divisionOf(findGauge(capture, first.row.gaugeId) ?? DIAL);
    return mustRedo(zerosOf(capture, first.row.zeroRunId).zeros, division, capture.window?.value);
  };
  return runs.findLast((run) => !failed(run)) ?? runs.at(-1) ?? [];
};

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
    lifter: lifter.map(lengthOf),
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
  };
};

/**
 * The sets of one bore. Each set stands on the last run whose closing zero held; a set without
 * lifter readings of its own takes those of the set before it.
 */
export const boreSetsOf = (capture: Capture, key: string): readonly BoreSet[] => {
  const here = capture.judged.filter(
    ({ place, state }) => state === 'counts' && positionKey(place, 'bore') === key,
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
      foot: feet.map(lengthOf),
      used,
      superseded: all.filter((reading) => !bore.includes(reading)),
    });
  }
  return sets;
};
