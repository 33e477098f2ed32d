import { type Actor, may } from '@/domain/access/permission';
import { absent, type Failure, invalid } from '@/domain/failure';
import { fail, ok, type Result } from '@/domain/result';
import { Season } from '@/entities/series/season';
import { performAct } from '../act/perform-act';
import type { Ports } from '../ports';
import { isSlug, slugOf } from './slug';

export interface NewSeason {
  readonly act: string;
  readonly seriesId: string;
  readonly id: string;
  readonly name: string;
  /** ISO 8601 days. */
  readonly startsOn: string;
  readonly endsOn: string;
}

const DAY = /^\d{4}-\d\d-\d\d$/;

/** Opens a season of a series. */
export const openSeason = async (
  deps: Pick<Ports, 'db' | 'clock' | 'random' | 'jobs'>,
  actor: Actor,
  input: NewSeason,
): Promise<Result<{ readonly seasonId: string }, Failure>> => {
  if (!may(actor, 'series.administer', input.seriesId)) return fail(absent());
  const { act: id, seriesId, ...asked } = input;
  const slug = slugOf(input.name);
  const faults = [
    ...(isSlug(slug)
      ? []
      : [{ pointer: '/name', detail: 'Give the season a name, such as 2026.' }]),
    ...(DAY.test(input.startsOn) ? [] : [{ pointer: '/startsOn', detail: 'Give the first day.' }]),
    ...(DAY.test(input.endsOn) && input.endsOn >= input.startsOn
      ? []
      : [{ pointer: '/endsOn', detail: 'Give the last day; it is not before the first.' }]),
  ];
  if (faults.length > 0) return fail(invalid(faults));
  return performAct(
    deps,
    actor,
    { id, kind: 'open-season', seriesId, input: asked },
    async ({ em }) => {
      if ((await em.count(Season, { seriesId, slug })) > 0) {
        return fail(invalid([{ pointer: '/name', detail: 'There is a season of this name.' }]));
      }
      em.persist(em.create(Season, { seriesId, slug, ...asked, name: input.name.trim() }));
      return ok({ seasonId: input.id });
    },
  );
};
