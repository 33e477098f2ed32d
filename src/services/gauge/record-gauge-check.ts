import type { GaugeCheckRequest } from '@/contracts/gauge/check';
import { type Actor, may } from '@/domain/access/permission';
import { absent, type Failure, invalid } from '@/domain/failure';
import { findWeakness } from '@/domain/inspection/capture/gauge-record';
import { isAllowed, largestDifference } from '@/domain/inspection/gauge/ring-check';
import { canonicalJson } from '@/domain/ledger/canonical';
import type { Written } from '@/domain/quantity/dimension';
import { fromStored } from '@/domain/quantity/stored';
import { fail, ok, type Result } from '@/domain/result';
import { toDocument } from '@/domain/rulebook/document';
import { Event } from '@/entities/event/event';
import { GaugeRow } from '@/entities/event/gauge';
import { Inspection } from '@/entities/event/inspection';
import { performAct } from '../act/perform-act';
import { registered } from '../inspection/read/inspection-file';
import type { Ports } from '../ports';

export interface GaugeChecked {
  readonly id: string;
  readonly difference: Written;
  readonly good: boolean;
}

const MINUTES_AHEAD = 10;

/**
 * Records what a gauge read on a ring of the series, or at its zero, beside what it ought to have read.
 * A ring that is itself out of calibration or withdrawn proves nothing and is refused.
 */
export const recordGaugeCheck = async (
  deps: Pick<Ports, 'db' | 'clock' | 'random' | 'jobs'>,
  actor: Actor,
  input: GaugeCheckRequest & { readonly seriesId: string },
): Promise<Result<GaugeChecked, Failure>> => {
  const { act, seriesId, ...check } = input;
  if (!may(actor, 'inspection.record', seriesId)) return fail(absent());
  return performAct(
    deps,
    actor,
    { id: act, kind: 'record-gauge-check', seriesId, input: toDocument(check) },
    async ({ em, at, append, line }) => {
      const { gaugeId, ringId, inspectionId, readings, expected, checkedAt } = check;
      const gauge = await em.findOne(GaugeRow, { seriesId, id: gaugeId });
      const inspection = inspectionId
        ? await em.findOne(Inspection, { seriesId, id: inspectionId })
        : null;
      const eventId = inspection?.eventId ?? check.eventId;
      const event = eventId ? await em.findOne(Event, { seriesId, id: eventId }) : null;
      if (gauge === null || (inspectionId && !inspection) || (eventId && !event))
        return fail(absent());
      const say = (pointer: string, detail: string) => fail(invalid([{ pointer, detail }]));
      if (Date.parse(checkedAt) > at.getTime() + MINUTES_AHEAD * 60_000)
        return say('/checkedAt', 'This lies in the future.');
      if (check.kind === 'ring') {
        const row = ringId ? await em.findOne(GaugeRow, { seriesId, id: ringId }) : null;
        const ring = row && registered(row);
        if (ring === null || ring.kind !== 'setting-ring')
          return say('/ringId', 'Choose a setting ring of the register.');
        const zone = event?.zone ?? 'UTC';
        const weakness = findWeakness(ring, { occurredAt: checkedAt, zone });
        if (weakness !== undefined)
          return say('/ringId', `A check on this ring proves nothing: ${weakness.words}.`);
      } else if (ringId !== null) return say('/ringId', 'A check at the zero has no ring.');
      const difference = largestDifference(readings, expected);
      const good = isAllowed(difference, fromStored(check.allowed, 'length'));
      const written = { text: difference.text, unit: difference.unit };
      append('gauge_check', [
        {
          series_id: seriesId,
          id: check.id,
          gauge_id: gaugeId,
          kind: check.kind,
          ring_id: ringId,
          event_id: eventId,
          inspection_id: inspectionId,
          readings,
          expected_text: expected.text,
          expected_unit: expected.unit,
          difference_text: written.text,
          difference_unit: written.unit,
          allowed_text: check.allowed.text,
          allowed_unit: check.allowed.unit,
          good,
          witness: check.witness.trim(),
          note: check.note.trim(),
          checked_at: checkedAt,
          recorded_by: actor.personId,
        },
      ]);
      line({
        seriesId,
        kind: 'gauge-checked',
        contents: {
          check: {
            text: canonicalJson(
              toDocument({
                document: 'tagwire/gauge-check',
                version: '1',
                ...check,
                eventId,
                difference: written,
                good,
                by: actor.personId,
              }),
            ),
            open: false,
          },
        },
        refs: { gauge: gaugeId, ...(inspectionId ? { inspection: inspectionId } : {}) },
      });
      return ok({ id: check.id, difference: written, good });
    },
  );
};
