import { type EntityManager, LockMode } from '@mikro-orm/postgresql';
import type { DrawCommitment, DrawMade, DrawVoid } from '@/domain/draw/documents';
import { absent, type Failure, failure } from '@/domain/failure';
import { isId } from '@/domain/is-id';
import { sha256, utf8 } from '@/domain/ledger/bytes';
import { canonicalJson } from '@/domain/ledger/canonical';
import { fail, ok, type Result } from '@/domain/result';
import { Event } from '@/entities/event/event';
import type { Act } from '../act/perform-act';
import { type DrawRow, findDrawRow, findDrawState } from './find-history';
import { whoBefore } from './who-before';

export interface OpenDraw {
  readonly row: DrawRow;
  readonly commitment: DrawCommitment;
}

/** The draw, if it is announced and neither made nor void; others that want to end it wait. */
export const takeOpenDraw = async (
  em: EntityManager,
  seriesId: string,
  drawId: string,
): Promise<Result<OpenDraw, Failure>> => {
  const named = isId(drawId) ? await findDrawRow(em, seriesId, drawId) : undefined;
  if (named === undefined) return fail(absent());
  const { eventId, classId } = named;
  const event = await em.findOneOrFail(
    Event,
    { seriesId, id: eventId },
    { lockMode: LockMode.PESSIMISTIC_WRITE, refresh: true },
  );
  const row = await findDrawRow(em, seriesId, drawId);
  if (row?.end) {
    const words =
      row.end === 'made'
        ? 'This draw was made. It is made once and stands.'
        : 'This draw was declared void and cannot be made.';
    const who = await whoBefore(em, event, classId);
    return fail(failure('not-in-this-state', `${words} ${who}`));
  }
  const state = await findDrawState(em, { seriesId, eventId, classId });
  if (row === undefined || state.at !== 'committed' || state.commitment.draw !== drawId)
    throw new Error(`Draw ${drawId} has no end, yet is not the open one of its class.`);
  return ok({ row, commitment: state.commitment });
};

/** Takes the secret from under its cover. The act must end the draw, or nothing of it is kept. */
export const openSecret = async (
  em: EntityManager,
  seriesId: string,
  drawId: string,
): Promise<Uint8Array> => {
  const [row] = await em.execute<{ secret: Buffer | null }[]>(
    'select append.open_draw_secret(?, ?) as secret',
    [seriesId, drawId],
  );
  if (row?.secret == null) throw new Error(`The secret of draw ${drawId} is not there.`);
  return new Uint8Array(row.secret);
};

/** Publishes the draw's end: its row and its ledger line. Gives the document's exact text. */
export const writeEnd = async (
  act: Act,
  { row }: OpenDraw,
  input: { readonly seriesId: string; readonly by: string; readonly ended: DrawMade | DrawVoid },
): Promise<string> => {
  const { seriesId, by, ended } = input;
  const document = canonicalJson(ended);
  const made = ended.type === 'tagwire/draw-made';
  const [announced] = await act.em.execute<{ index: string }[]>(
    `select index from record.ledger_line
     where series_id = ? and act_id = ? and kind = 'draw-committed'`,
    [seriesId, row.actId],
  );
  if (announced === undefined) throw new Error(`Draw ${row.id} was announced without a line.`);
  act.append('draw_end', [
    {
      series_id: seriesId,
      draw_id: row.id,
      kind: made ? 'made' : 'void',
      document,
      hash: sha256(utf8(document)),
      ended_by: by,
      ended_at: act.at.toISOString(),
    },
  ]);
  act.line({
    seriesId,
    kind: made ? 'draw-made' : 'draw-void',
    contents: { draw: { text: document, open: true } },
    refs: { committed: String(announced.index), draw: row.id, event: row.eventId },
  });
  return document;
};
