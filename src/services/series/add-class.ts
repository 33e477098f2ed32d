import { type Actor, may } from '@/domain/access/permission';
import { absent, type Failure, invalid } from '@/domain/failure';
import { fail, ok, type Result } from '@/domain/result';
import { RaceClass } from '@/entities/series/race-class';
import { Season } from '@/entities/series/season';
import { performAct } from '../act/perform-act';
import type { Ports } from '../ports';
import { isSlug, slugOf } from './slug';

export interface NewClass {
  readonly act: string;
  readonly seriesId: string;
  readonly id: string;
  readonly seasonId: string;
  readonly name: string;
}

/** Adds a class to a season; its rulebook is written next. */
export const addClass = async (
  deps: Pick<Ports, 'db' | 'clock' | 'random' | 'jobs'>,
  actor: Actor,
  input: NewClass,
): Promise<Result<{ readonly classId: string }, Failure>> => {
  if (!may(actor, 'series.administer', input.seriesId)) return fail(absent());
  const { act: id, seriesId, seasonId } = input;
  const name = input.name.trim();
  const slug = slugOf(name);
  if (!isSlug(slug)) {
    return fail(
      invalid([{ pointer: '/name', detail: 'Give the class a name of letters and digits.' }]),
    );
  }
  return performAct(
    deps,
    actor,
    { id, kind: 'add-class', seriesId, input: { id: input.id, seasonId, name } },
    async ({ em }) => {
      if ((await em.count(Season, { seriesId, id: seasonId })) === 0) return fail(absent());
      if ((await em.count(RaceClass, { seriesId, seasonId, slug })) > 0) {
        return fail(invalid([{ pointer: '/name', detail: 'There is a class of this name.' }]));
      }
      em.persist(em.create(RaceClass, { seriesId, id: input.id, seasonId, slug, name }));
      return ok({ classId: input.id });
    },
  );
};
