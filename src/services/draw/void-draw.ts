import { type Actor, may } from '@/domain/access/permission';
import { commitmentHash } from '@/domain/draw/seed';
import { absent, type Failure } from '@/domain/failure';
import { toHex } from '@/domain/ledger/bytes';
import { fail, ok, type Result } from '@/domain/result';
import { performAct } from '../act/perform-act';
import type { Ports } from '../ports';
import { openSecret, takeOpenDraw, writeEnd } from './end-draw';

/**
 * Declares an announced draw void, in public and with its reason. The secret is shown all the same.
 * A draw that was made stands; after a void one, the next names it.
 */
export const voidDraw = async (
  deps: Pick<Ports, 'db' | 'clock' | 'random' | 'jobs'>,
  actor: Actor,
  input: {
    readonly act: string;
    readonly seriesId: string;
    readonly drawId: string;
    readonly reason: string;
  },
): Promise<Result<{ readonly document: string }, Failure>> => {
  const { act, seriesId, drawId, reason } = input;
  if (!may(actor, 'cars.pick', seriesId)) return fail(absent());
  return performAct(
    deps,
    actor,
    { id: act, kind: 'void-draw', seriesId, input: { drawId, reason } },
    async (inside) => {
      const open = await takeOpenDraw(inside.em, seriesId, drawId);
      if (!open.ok) return open;
      const { commitment } = open.value;
      const secret = await openSecret(inside.em, seriesId, drawId);
      const document = await writeEnd(inside, open.value, {
        seriesId,
        by: actor.personId,
        ended: {
          v: '1',
          type: 'tagwire/draw-void',
          draw: drawId,
          commitment: toHex(commitmentHash(commitment)),
          reason,
          secret: toHex(secret),
        },
      });
      return ok({ document });
    },
  );
};
