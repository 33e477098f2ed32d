import type { GaugeRequest } from '@/contracts/gauge/gauge';
import { type Actor, may } from '@/domain/access/permission';
import { absent, type Failure, invalid, stale } from '@/domain/failure';
import { fail, ok, type Result } from '@/domain/result';
import { toDocument } from '@/domain/rulebook/document';
import { GaugeRow } from '@/entities/event/gauge';
import { KeptFile } from '@/entities/paperwork/file';
import { performAct } from '../act/perform-act';
import type { Ports } from '../ports';
import { gaugeEntryText } from './gauge-entry';

/**
 * Enters a gauge in the register, or changes its figures; what it read before stays as it was signed,
 * and every state of the register stays on record.
 */
export const saveGauge = async (
  deps: Pick<Ports, 'db' | 'clock' | 'random' | 'jobs'>,
  actor: Actor,
  input: GaugeRequest & { readonly seriesId: string },
): Promise<Result<{ readonly id: string; readonly version: number }, Failure>> => {
  const { act, seriesId, ...gauge } = input;
  if (!may(actor, 'gauge.manage', seriesId)) return fail(absent());
  return performAct(
    deps,
    actor,
    { id: act, kind: 'save-gauge', seriesId, input: toDocument(gauge) },
    async ({ em, append, line }) => {
      const { id, description, status, version } = gauge;
      const code = gauge.code.trim();
      const standing = await em.findOne(GaugeRow, { seriesId, id });
      const other = await em.findOne(GaugeRow, { seriesId, code });
      if (other !== null && other.id !== id)
        return fail(invalid([{ pointer: '/code', detail: 'Another gauge has this code.' }]));
      if (standing === null && version !== 0) return fail(absent());
      if (standing !== null && standing.version !== version) return fail(stale());
      const { certificateFile } = description;
      const file =
        certificateFile === undefined
          ? null
          : await em.findOne(KeptFile, { seriesId, id: certificateFile, gaugeId: id });
      if (certificateFile !== undefined && file?.state !== 'kept') {
        const detail = 'This certificate’s file is not kept with this gauge. Send it again.';
        return fail(invalid([{ pointer: '/description/certificateFile', detail }]));
      }
      const row =
        standing ?? em.create(GaugeRow, { seriesId, id, code, description, status, version: 1 });
      row.code = code;
      row.description = description;
      row.status = status;
      em.persist(row);
      await em.flush();
      const document = gaugeEntryText(row, file?.sha256?.toString('hex'));
      append('gauge_entry', [
        {
          series_id: seriesId,
          id: deps.random.uuid(),
          gauge_id: id,
          document,
          recorded_by: actor.personId,
        },
      ]);
      line({
        seriesId,
        kind: 'gauge-entered',
        contents: { gauge: { text: document, open: false } },
        refs: { gauge: id },
      });
      return ok({ id, version: row.version });
    },
  );
};
