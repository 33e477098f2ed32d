import { type Actor, may } from '@/domain/access/permission';
import { absent, type Failure, failure } from '@/domain/failure';
import { isId } from '@/domain/is-id';
import { fail, ok, type Result } from '@/domain/result';
import type { BarnFeed, Ports } from '../../ports';
import { readMark } from './read-mark';

export interface Followed {
  /** Ends the following. */
  readonly leave: () => void;
  /** How far the barn had come when it began. */
  readonly mark: string;
  readonly readMark: () => Promise<string>;
}

/** Hears what changes in a series' barn, for whoever may read its inspections. */
export const followBarn = async (
  deps: Pick<Ports, 'db' | 'barn'>,
  actor: Actor,
  input: { readonly seriesId: string; readonly hear: Parameters<BarnFeed['subscribe']>[1] },
): Promise<Result<Followed, Failure>> => {
  const { seriesId, hear } = input;
  if (!isId(seriesId) || !may(actor, 'inspection.read', seriesId)) return fail(absent());
  let leave: () => void;
  try {
    leave = await deps.barn.subscribe(seriesId, hear);
  } catch {
    return fail(failure('unavailable', 'Nothing is told at once now; the page asks by itself.'));
  }
  const db = deps.db.fork();
  const mark = () => readMark({ db }, seriesId);
  // Read after the subscription: what comes in between is told twice, never missed.
  return ok({ leave, mark: await mark(), readMark: mark });
};
