import { type Failure, failure } from '../failure';
import { sha256, toHex } from '../ledger/bytes';
import { canonicalBytes } from '../ledger/canonical';
import { fail, ok, type Result } from '../result';
import type { DrawCommitment, DrawMade, DrawVoid } from './documents';
import { commitmentHash } from './seed';

export type DrawAct = DrawCommitment | DrawMade | DrawVoid;

/** Where the draw of one subject stands. There is no state for a second draw after a first. */
export type DrawState =
  | { readonly at: 'none' }
  | { readonly at: 'committed'; readonly commitment: DrawCommitment }
  | { readonly at: 'made'; readonly commitment: DrawCommitment; readonly made: DrawMade }
  | { readonly at: 'void'; readonly commitment: DrawCommitment; readonly ended: DrawVoid };

const refused = (detail: string) => fail(failure('not-in-this-state', detail));

/**
 * The next state, or a refusal. A draw that was made stays made: it can neither be made again
 * nor declared void. Only after a void draw may the same subject be drawn anew, naming that void.
 */
export const nextDrawState = (state: DrawState, act: DrawAct): Result<DrawState, Failure> => {
  if (act.type === 'tagwire/draw-commitment') return nextCommitment(state, act);
  if (state.at !== 'committed') return refused('No draw is open for this.');
  const { commitment } = state;
  const fits = act.draw === commitment.draw && act.commitment === toHex(commitmentHash(commitment));
  if (!fits) return refused('This belongs to another draw.');
  return act.type === 'tagwire/draw-made'
    ? ok({ at: 'made', commitment, made: act })
    : ok({ at: 'void', commitment, ended: act });
};

const nextCommitment = (state: DrawState, act: DrawCommitment): Result<DrawState, Failure> => {
  if (state.at === 'none') {
    return act.follows === ''
      ? ok({ at: 'committed', commitment: act })
      : refused('There is no void draw to follow.');
  }
  if (state.at !== 'void') return refused('This was drawn, or is about to be: no second draw.');
  const { commitment, ended } = state;
  const sameSubject =
    act.series === commitment.series &&
    act.event === commitment.event &&
    act.subject === commitment.subject;
  if (!sameSubject || act.draw === commitment.draw)
    return refused('This is another draw’s history.');
  return act.follows === toHex(sha256(canonicalBytes(ended)))
    ? ok({ at: 'committed', commitment: act })
    : refused('A draw after a void one names the void draw it follows.');
};
