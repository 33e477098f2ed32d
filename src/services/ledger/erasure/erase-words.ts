import { type Failure, failure } from '@/domain/failure';
import { fail, ok, type Result } from '@/domain/result';
import type { Act } from '../../act/perform-act';
import { type ErasureSubject, eraseLines, listErasable } from './erase-lines';
import { findErasureObstacle } from './obstacle';

/**
 * Within an act: erases all words of a subject that has no files, unless they must be kept.
 *
 * @returns how many contents went
 */
export const eraseWords = async (
  act: Act,
  {
    nothing,
    ...erasing
  }: {
    readonly seriesId: string;
    readonly subject: ErasureSubject;
    readonly reason: string;
    /** What is said where there is nothing to erase. */
    readonly nothing: string;
  },
): Promise<Result<{ readonly contents: number }, Failure>> => {
  const { seriesId, subject } = erasing;
  const obstacle = await findErasureObstacle(act.em, seriesId, subject);
  if (obstacle !== undefined) return fail(failure('not-in-this-state', obstacle));
  const contents = await listErasable(act.em, seriesId, subject);
  if (contents.length === 0) return fail(failure('not-in-this-state', nothing));
  await eraseLines(act, { ...erasing, contents });
  return ok({ contents: contents.length });
};
