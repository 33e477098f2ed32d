import type { EntityManager } from '@mikro-orm/postgresql';
import { type Actor, may } from '@/domain/access/permission';
import { absent, type Failure } from '@/domain/failure';
import { fail, ok, type Result } from '@/domain/result';
import type { Ports } from '../../ports';
import { type Due, listDue } from './list-due';

export type Keeping = 'keep' | 'season-end';

/** What a series keeps for how long; for good where it has set nothing. */
export interface Retention {
  readonly uninspectedPaperwork: Keeping;
  readonly penStrokes: Keeping;
  /** Names and reasons given on an event's day. */
  readonly dayWords: Keeping;
  /** 0 where nothing was ever set. */
  readonly version: number;
}

export const readRetention = async (em: EntityManager, seriesId: string): Promise<Retention> => {
  const [row] = await em.execute<Retention[]>(
    `select uninspected_paperwork as "uninspectedPaperwork", pen_strokes as "penStrokes",
            day_words as "dayWords", version from public.retention where series_id = ?`,
    [seriesId],
  );
  return row ?? { uninspectedPaperwork: 'keep', penStrokes: 'keep', dayWords: 'keep', version: 0 };
};

/** A series' setting, and what is due by it, for its officials. */
export const findRetention = async (
  deps: Pick<Ports, 'db' | 'clock'>,
  actor: Actor,
  seriesId: string,
): Promise<Result<{ readonly set: Retention; readonly due: readonly Due[] }, Failure>> => {
  if (!may(actor, 'series.administer', seriesId)) return fail(absent());
  return ok({
    set: await readRetention(deps.db, seriesId),
    due: await listDue(deps.db, seriesId, deps.clock.now()),
  });
};
