import { divisionOf } from '../../measurement/gauge-figures';
import type { Written } from '../../quantity/dimension';
import { quantityOf } from '../../quantity/quantity';
import { driftOf } from '../../tappet/dial';
import { allowedDrift, mustRedo } from '../../tappet/redo';
import { DIAL } from '../../tappet/sheet-budget';
import type { JudgedReading } from '../capture/readings-that-count';
import { positionKey } from '../capture/rows';
import { type Capture, findGauge, zerosOf } from './runs';

/** A zero run that was closed, and whether its zero held. */
export interface RunOutcome {
  readonly runId: string;
  readonly drift: Written;
  readonly allowed: Written;
  readonly held: boolean;
  /** Its readings that count still, and their bores in taking order. */
  readonly readings: readonly JudgedReading[];
  readonly bores: readonly string[];
}

/** Every run with both of its zeros. One that failed names its bores and erases none. */
export const runOutcomes = (capture: Capture): readonly RunOutcome[] =>
  [...new Set(capture.zeros.map(({ runId }) => runId))].flatMap((runId): readonly RunOutcome[] => {
    const { opening, zeros } = zerosOf(capture, runId);
    const drift = driftOf(zeros);
    if (opening === undefined || drift === undefined) return [];
    const division = divisionOf(findGauge(capture, opening.gaugeId) ?? DIAL);
    const window = capture.window?.value;
    const { unit } = opening.reading;
    const readings = capture.judged.filter(
      ({ row, state }) => row.zeroRunId === runId && state === 'counts',
    );
    return [
      {
        runId,
        drift: quantityOf('length', drift, unit),
        allowed: quantityOf('length', allowedDrift(division, window), unit),
        held: !mustRedo(zeros, division, window),
        readings,
        bores: [...new Set(readings.map(({ place }) => positionKey(place, 'bore')))],
      },
    ];
  });
