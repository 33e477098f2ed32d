import { type Actor, may } from '@/domain/access/permission';
import { absent, type Failure } from '@/domain/failure';
import { isId } from '@/domain/is-id';
import { fail, ok, type Result } from '@/domain/result';
import { performAct } from '../../act/perform-act';
import type { Ports } from '../../ports';
import { lockHolds } from './obstacle';
import { readReason } from './read-reason';

/** Stops every erasure of a paperwork, of an inspection, or in the whole series, until the hold is lifted. */
export const placeHold = async (
  deps: Pick<Ports, 'db' | 'clock' | 'random' | 'jobs'>,
  actor: Actor,
  input: {
    readonly act: string;
    readonly id: string;
    readonly seriesId: string;
    /** One of the two, or neither for the whole series. */
    readonly paperworkId?: string | undefined;
    readonly inspectionId?: string | undefined;
    readonly reason: string;
  },
): Promise<Result<{ readonly holdId: string }, Failure>> => {
  const { act, id, seriesId, paperworkId, inspectionId } = input;
  if (!may(actor, 'series.administer', seriesId) || !isId(id)) return fail(absent());
  const [kind, subject] =
    paperworkId !== undefined
      ? (['paperwork', paperworkId] as const)
      : inspectionId !== undefined
        ? (['inspection', inspectionId] as const)
        : (['series', seriesId] as const);
  if (kind !== 'series') {
    const [known] = await deps.db.execute<{ n: number }[]>(
      `select 1 as n from public.${kind} where series_id = ? and id::text = ?`,
      [seriesId, subject],
    );
    if (known === undefined) return fail(absent());
  }
  const said = readReason(input.reason, 'why nothing may be erased');
  if (!said.ok) return said;
  const reason = said.value;
  return performAct(
    deps,
    actor,
    { id: act, kind: 'place-hold', seriesId, input: { id, subject, reason } },
    async ({ em, at }) => {
      await lockHolds(em, seriesId);
      await em.execute(
        `insert into public.hold (series_id, id, subject_kind, subject_id, reason, placed_by, since)
         values (?, ?, ?, ?, ?, ?, ?)`,
        [seriesId, id, kind, subject, reason, actor.personId, at],
      );
      return ok({ holdId: id });
    },
  );
};
