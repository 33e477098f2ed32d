import { divisionOf } from '../../measurement/gauge-figures';
import { fromStored } from '../../quantity/stored';
import type { BoreSheet, Length, Zeros } from '../../tappet/bore-sheet';
import { mustRedo } from '../../tappet/redo';
import { DIAL } from '../../tappet/sheet-budget';
import { type GaugeRecord, gaugeOf } from '../capture/gauge-record';
import type { JudgedReading } from '../capture/readings-that-count';
import { inTakingOrder, type ZeroRow } from '../capture/rows';

/** What the bay recorded, as measuring needs it. */
export interface Capture {
  /** All readings with what became of them: struck ones took their turn in a run. */
  readonly judged: readonly JudgedReading[];
  readonly zeros: readonly ZeroRow[];
  readonly gauges: readonly GaugeRecord[];
  /** Unit of the results. */
  readonly unit: string;
  /** Width of the permitted zone of the clearance, where a clause gives one. */
  readonly window?: Length | undefined;
  /** Of that clause. */
  readonly fitRatio?: string | undefined;
  readonly materials?: BoreSheet['materials'];
  readonly repeatability?: BoreSheet['repeatability'];
}

export const findGauge = (capture: Capture, id: string | undefined) => {
  const record = capture.gauges.find((gauge) => gauge.id === id);
  return record && gaugeOf(record, 'length');
};

/** A run's opening and last closing zero, and the turn of each of its readings, struck ones included. */
export const zerosOf = (capture: Capture, runId: string | undefined) => {
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

/** Readings of one method and run, in the order in which the runs began. */
export const runsOf = (
  readings: readonly JudgedReading[],
): readonly (readonly JudgedReading[])[] => {
  const runs = new Map<string, JudgedReading[]>();
  for (const reading of readings) {
    const run = `${reading.row.method} ${reading.row.zeroRunId ?? ''}`;
    runs.set(run, [...(runs.get(run) ?? []), reading]);
  }
  return [...runs.values()];
};

/** The last run whose closing zero held; the last run of all where none did. */
export const standingRun = (capture: Capture, runs: readonly (readonly JudgedReading[])[]) => {
  const failed = (run: readonly JudgedReading[]) => {
    const [first] = run;
    if (first?.row.method !== 'comparative') return false;
    const division = divisionOf(findGauge(capture, first.row.gaugeId) ?? DIAL);
    return mustRedo(zerosOf(capture, first.row.zeroRunId).zeros, division, capture.window?.value);
  };
  return runs.findLast((run) => !failed(run)) ?? runs.at(-1) ?? [];
};
