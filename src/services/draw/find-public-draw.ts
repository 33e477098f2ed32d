import type { EntityManager } from '@mikro-orm/postgresql';
import type { PublicDrawAnswer } from '@/contracts/draw/draw';
import type { DrawShown } from '@/contracts/draw/draw-shown';
import { isId } from '@/domain/is-id';
import { findCovering } from '../ledger/checkpoint/find-checkpoint';
import { proofUnder } from '../ledger/proof/prove-line';
import type { Ports } from '../ports';
import { type DrawRow, findDrawRow, listDrawRows } from './find-history';

type Logged = PublicDrawAnswer['announced'];

/** A document with the line that commits to it, and the line's proof once a signed head covers it. */
const findLogged = async (
  em: EntityManager,
  seriesId: string,
  actId: string,
  document: string,
): Promise<Logged> => {
  const [row] = await em.execute<{ index: string; salt: string }[]>(
    `select l.index, encode(c.salt, 'hex') as salt
     from record.ledger_line l
     join record.ledger_content c
       on c.series_id = l.series_id and c.line_index = l.index and c.role = 'draw'
     where l.series_id = ? and l.act_id = ?`,
    [seriesId, actId],
  );
  if (row === undefined) throw new Error(`Act ${actId} of a draw has no ledger line.`);
  const index = Number(row.index);
  const head = await findCovering(em, seriesId, index);
  const proof = head && (await proofUnder({ db: em }, seriesId, index, head));
  return { document, salt: row.salt, index, proof: proof ?? null };
};

const publish = async (
  em: EntityManager,
  seriesId: string,
  row: DrawRow,
): Promise<PublicDrawAnswer> => {
  const { id, document, actId, end, endDocument, endActId } = row;
  const announced = await findLogged(em, seriesId, actId, document);
  if (end === null || endDocument === null || endActId === null)
    return { id, announced, end: null };
  return {
    id,
    announced,
    end: { kind: end, ...(await findLogged(em, seriesId, endActId, endDocument)) },
  };
};

/** A draw as everybody may see it; nothing for an unknown one. */
export const findPublicDraw = async (
  deps: Pick<Ports, 'db'>,
  asked: { readonly seriesId: string; readonly drawId: string },
): Promise<PublicDrawAnswer | undefined> => {
  if (!isId(asked.drawId)) return undefined;
  const row = await findDrawRow(deps.db, asked.seriesId, asked.drawId);
  return row && publish(deps.db, asked.seriesId, row);
};

/** Every draw of an event, void ones too, in the order announced. */
export const listPublicDraws = async (
  deps: Pick<Ports, 'db'>,
  asked: { readonly seriesId: string; readonly event: string },
): Promise<readonly DrawShown[]> => {
  const { seriesId } = asked;
  const [event] = await deps.db.execute<{ id: string }[]>(
    'select id from public.event where series_id = ? and slug = ?',
    [seriesId, asked.event],
  );
  if (event === undefined) return [];
  const rows = await listDrawRows(deps.db, { seriesId, eventId: event.id });
  const entries = await deps.db.execute<
    { car: string; classId: string; state: 'entered' | 'withdrawn' }[]
  >(
    `select car_number as car, class_id as "classId", state from public.entry
     where series_id = ? and event_id = ? order by length(car_number), car_number`,
    [seriesId, event.id],
  );
  const shown: DrawShown[] = [];
  for (const row of rows) {
    const { pool } = JSON.parse(row.document) as { pool: { car: string }[] };
    const inPool = new Set(pool.map(({ car }) => car));
    const ofClass = entries.filter(({ classId }) => classId === row.classId);
    shown.push({
      published: await publish(deps.db, seriesId, row),
      announcedAt: row.announcedAt,
      endedAt: row.endedAt,
      enteredLater: ofClass
        .filter(({ car, state }) => state === 'entered' && !inPool.has(car))
        .map(({ car }) => car),
      withdrawn: ofClass
        .filter(({ car, state }) => state === 'withdrawn' && inPool.has(car))
        .map(({ car }) => car),
    });
  }
  return shown;
};
