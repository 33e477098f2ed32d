import type { GaugeRequest } from '@/contracts/gauge/gauge';
import { type Actor, may } from '@/domain/access/permission';
import { absent, type Failure, invalid, stale } from '@/domain/failure';
import { fail, ok, type Result } from '@/domain/result';
import { toDocument } from '@/domain/rulebook/document';
import { GaugeRow } from '@/entities/event/gauge';
import { performAct } from '../act/perform-act';
import type { Ports } from '../ports';

/** Enters a gauge in the register, or changes its figures; what it read before stays as it was signed. */
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
    async ({ em }) => {
      const { id, code, description, status, version } = gauge;
      const standing = await em.findOne(GaugeRow, { seriesId, id });
      const other = await em.findOne(GaugeRow, { seriesId, code: code.trim() });
      if (other !== null && other.id !== id)
        return fail(invalid([{ pointer: '/code', detail: 'Another gauge has this code.' }]));
      if (standing === null && version !== 0) return fail(absent());
      if (standing !== null && standing.version !== version) return fail(stale());
      const row =
        standing ??
        em.create(GaugeRow, { seriesId, id, code: code.trim(), description, status, version: 1 });
      row.code = code.trim();
      row.description = description;
      row.status = status;
      em.persist(row);
      await em.flush();
      return ok({ id, version: row.version });
    },
  );
};
