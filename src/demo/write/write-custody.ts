import { GaugeRow } from '@/entities/event/gauge';
import { Inspection } from '@/entities/event/inspection';
import { recordCustody } from '@/services/custody/record-custody';
import { recordSeal } from '@/services/custody/record-seal';
import { tagPart } from '@/services/custody/tag-part';
import { recordGaugeCheck } from '@/services/gauge/record-gauge-check';
import { reportGaugeBad } from '@/services/gauge/report-gauge-bad';
import type { DemoGauges } from '../make/measure';
import { CHIEF, INSPECTOR } from '../people';
import { done, type Stage } from '../stage';

const inch = (text: string) => ({ text, unit: 'in' });

/** The evening begins with the bore gauge on the ring; the old caliper did not pass its own check. */
export const writeChecks = async (
  stage: Stage,
  seriesId: string,
  gauges: DemoGauges,
  inspectionId: string,
): Promise<void> => {
  const { eventId } = await stage.ports().db.findOneOrFail(Inspection, { id: inspectionId });
  const check = async (
    gaugeId: string,
    readings: readonly string[],
    expected: string,
    allowed: string,
  ) =>
    done(
      'record a check on the ring',
      await recordGaugeCheck(stage.ports(), stage.actor(INSPECTOR), {
        act: stage.uuid(),
        id: stage.uuid(),
        seriesId,
        gaugeId,
        kind: 'ring',
        ringId: gauges.ring,
        eventId,
        inspectionId: null,
        readings: readings.map(inch),
        expected: inch(expected),
        allowed: inch(allowed),
        witness: '',
        note: '',
        checkedAt: stage.clock.pass(60).toISOString(),
      }),
    );
  await check(gauges.boreGauge, ['0.0000', '0.0000', '0.0001'], '0.0000', '0.0001');
  const caliper = await stage.ports().db.findOneOrFail(GaugeRow, { seriesId, code: 'CAL-01' });
  await check(caliper.id, ['0.846', '0.847'], '0.8440', '0.001');
  done(
    'find the caliper bad',
    await reportGaugeBad(stage.ports(), stage.actor(CHIEF), {
      act: stage.uuid(),
      id: stage.uuid(),
      seriesId,
      gaugeId: caliper.id,
      foundAt: stage.clock.pass(60).toISOString(),
      off: inch('0.003'),
      reason: 'Reads up to 0.003 in large on the ring; the jaws do not close.',
    }),
  );
};

/** A lifter of the breached clause is held, and the engine's seal was looked at and replaced. */
export const writeCustody = async (stage: Stage, inspectionId: string): Promise<void> => {
  const inspector = () => stage.actor(INSPECTOR);
  const at = () => stage.clock.pass(90).toISOString();
  const seal = async (kind: 'found' | 'removed' | 'applied', number: string) =>
    done(
      'record a seal',
      await recordSeal(stage.ports(), inspector(), {
        act: stage.uuid(),
        id: stage.uuid(),
        inspectionId,
        kind,
        number,
        place: 'intake manifold',
        state: kind === 'found' ? 'intact' : null,
        doneBy: INSPECTOR.name,
        note: '',
        occurredAt: at(),
      }),
    );
  await seal('applied', '20817');
  await seal('found', '20817');
  const partId = stage.uuid();
  done(
    'take a lifter into custody',
    await tagPart(stage.ports(), inspector(), {
      act: stage.uuid(),
      id: partId,
      kind: 'held',
      inspectionId,
      words: 'Lifter',
      placeOnEngine: 'exhaust 3',
      clause: '4.3',
      bag: 'B-114',
      takenFrom: 'Wren Halloway',
      takenBy: INSPECTOR.name,
      place: 'Bay 2',
      takenAt: at(),
      holdUntil: null,
    }),
  );
  done(
    'hand the lifter over',
    await recordCustody(stage.ports(), inspector(), {
      act: stage.uuid(),
      id: stage.uuid(),
      kind: 'hand-over',
      partId,
      giver: INSPECTOR.name,
      receiver: CHIEF.name,
      place: 'Impound, shelf 4',
      reason: 'Locked away for the night',
      occurredAt: at(),
    }),
  );
};
