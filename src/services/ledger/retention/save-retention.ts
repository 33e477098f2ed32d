import { type Actor, may } from '@/domain/access/permission';
import { absent, type Failure, stale } from '@/domain/failure';
import { fail, ok, type Result } from '@/domain/result';
import { performAct } from '../../act/perform-act';
import type { Ports } from '../../ports';
import type { Keeping, Retention } from './find-retention';

/** Sets what the series keeps for how long. Nothing is erased by it: what is due is confirmed first. */
export const saveRetention = async (
  deps: Pick<Ports, 'db' | 'clock' | 'random' | 'jobs'>,
  actor: Actor,
  input: {
    readonly act: string;
    readonly seriesId: string;
    /** The version that was looked at; 0 where nothing was set. */
    readonly version: number;
    readonly uninspectedPaperwork: Keeping;
    readonly penStrokes: Keeping;
    readonly dayWords: Keeping;
  },
): Promise<Result<Retention, Failure>> => {
  const { act, seriesId, version, uninspectedPaperwork, penStrokes, dayWords } = input;
  if (!may(actor, 'series.administer', seriesId)) return fail(absent());
  return performAct(
    deps,
    actor,
    {
      id: act,
      kind: 'save-retention',
      seriesId,
      input: { version: String(version), uninspectedPaperwork, penStrokes, dayWords },
    },
    async ({ em }) => {
      const values = [uninspectedPaperwork, penStrokes, dayWords, seriesId];
      const rows = await em.execute<unknown[]>(
        version === 0
          ? `insert into public.retention (uninspected_paperwork, pen_strokes, day_words, series_id)
             values (?, ?, ?, ?) on conflict do nothing returning 1`
          : `update public.retention set uninspected_paperwork = ?, pen_strokes = ?, day_words = ?,
             version = version + 1
             where series_id = ? and version = ? returning 1`,
        version === 0 ? values : [...values, version],
      );
      if (rows.length === 0) return fail(stale());
      return ok({ uninspectedPaperwork, penStrokes, dayWords, version: version + 1 });
    },
  );
};
