import type { AnnounceRequest } from '@/contracts/draw/draw';
import { type Actor, may } from '@/domain/access/permission';
import { findCommitmentFault } from '@/domain/draw/commitment-fault';
import type { DrawCommitment } from '@/domain/draw/documents';
import { type DrawState, nextDrawState } from '@/domain/draw/history';
import { commitmentHash, SECRET_LENGTH, secretHash } from '@/domain/draw/seed';
import { absent, type Failure, failure, invalid } from '@/domain/failure';
import { sha256, toHex } from '@/domain/ledger/bytes';
import { canonicalBytes, canonicalJson } from '@/domain/ledger/canonical';
import { fail, ok, type Result } from '@/domain/result';
import { RaceClass } from '@/entities/series/race-class';
import { performAct } from '../act/perform-act';
import { lockEvent } from '../event/lock-event';
import type { Ports } from '../ports';
import { findDrawState } from './find-history';
import { findPool } from './find-pool';
import { whoBefore } from './who-before';

const followed = (state: DrawState): string =>
  state.at === 'void' ? toHex(sha256(canonicalBytes(state.ended))) : '';

const NOT_NOW: Readonly<Partial<Record<DrawState['at'], string>>> = {
  committed: 'A draw is announced for this class already. Its pool and values stand.',
  made: 'This class was drawn. A draw is made once.',
};

const fault = (pointer: string, detail: string) => fail(invalid([{ pointer, detail }]));

/**
 * Announces the draw of a class before the session that makes the values. The secret is made here,
 * kept where nobody can read it, and only its hash is published and logged.
 */
export const announceDraw = async (
  deps: Pick<Ports, 'db' | 'clock' | 'random' | 'jobs'>,
  actor: Actor,
  input: AnnounceRequest & { readonly seriesId: string },
): Promise<Result<{ readonly id: string; readonly document: string }, Failure>> => {
  const { act, seriesId, ...request } = input;
  const { id, eventId, classId, values } = request;
  if (!may(actor, 'cars.pick', seriesId)) return fail(absent());
  return performAct(
    deps,
    actor,
    { id: act, kind: 'announce-draw', seriesId, input: request },
    async ({ em, at, append, line }) => {
      // The event's row is the queue in which draws of its classes stand.
      const event = await lockEvent(em, seriesId, eventId);
      const drawn =
        event && (await em.findOne(RaceClass, { seriesId, id: classId, seasonId: event.seasonId }));
      if (event === null || drawn === null) return fail(absent());
      const subject = { seriesId, eventId, classId };
      const state = await findDrawState(em, subject);
      const notNow = NOT_NOW[state.at];
      if (notNow !== undefined)
        return fail(
          failure('not-in-this-state', `${notNow} ${await whoBefore(em, event, classId)}`),
        );
      const { pool, hash } = await findPool(em, subject);
      if (pool.length === 0) return fault('/classId', 'No car is entered in this class.');
      if (hash !== request.poolHash)
        return fail(
          failure('stale', 'The entries changed after the pool was shown. Look at it again.'),
        );
      const sessionAt = new Date(request.sessionAt);
      if (sessionAt <= at)
        return fault('/sessionAt', 'The session must begin after the announcement.');
      if (request.select > pool.length)
        return fault('/select', `Only ${pool.length} cars are in the pool.`);
      const secret = deps.random.bytes(SECRET_LENGTH);
      const commitment: DrawCommitment = {
        v: '1',
        type: 'tagwire/draw-commitment',
        draw: id,
        series: seriesId,
        event: eventId,
        subject: state.at === 'void' ? state.commitment.subject : drawn.name,
        follows: followed(state),
        pool,
        select: String(request.select),
        secretHash: toHex(secretHash(secret)),
        sessionAt: sessionAt.toISOString(),
        values: [...values],
      };
      const wrong = findCommitmentFault(commitment);
      if (wrong !== undefined) return fault('/select', wrong);
      const next = nextDrawState(state, commitment);
      if (!next.ok) return next;
      const document = canonicalJson(commitment);
      append('draw', [
        {
          series_id: seriesId,
          id,
          event_id: eventId,
          class_id: classId,
          follows: commitment.follows,
          document,
          hash: commitmentHash(commitment),
          session_at: commitment.sessionAt,
          announced_by: actor.personId,
          announced_at: at.toISOString(),
        },
      ]);
      append('draw_secret', [{ series_id: seriesId, draw_id: id, secret }]);
      line({
        seriesId,
        kind: 'draw-committed',
        contents: { draw: { text: document, open: true } },
        refs: { draw: id, event: eventId },
      });
      return ok({ id, document });
    },
  );
};
