import type { EntityManager } from '@mikro-orm/postgresql';
import { readDrawCommitment, readDrawMade, readDrawVoid } from '@/domain/draw/documents';
import { type DrawAct, type DrawState, nextDrawState } from '@/domain/draw/history';
import type { Failure } from '@/domain/failure';
import type { Result } from '@/domain/result';

export interface DrawSubject {
  readonly seriesId: string;
  readonly eventId: string;
  readonly classId: string;
}

export interface DrawRow {
  readonly id: string;
  readonly eventId: string;
  readonly classId: string;
  readonly document: string;
  readonly announcedAt: string;
  readonly announcedBy: string;
  readonly actId: string;
  readonly end: 'made' | 'void' | null;
  readonly endDocument: string | null;
  readonly endedAt: string | null;
  readonly endedBy: string | null;
  readonly endActId: string | null;
}

const ISO = `at time zone 'UTC', 'YYYY-MM-DD"T"HH24:MI:SS.MS"Z"'`;

const SELECT = `
  select d.id, d.event_id as "eventId", d.class_id as "classId", d.document,
         to_char(d.announced_at ${ISO}) as "announcedAt", a.name as "announcedBy",
         d.act_id as "actId", e.kind as "end", e.document as "endDocument",
         to_char(e.ended_at ${ISO}) as "endedAt", b.name as "endedBy", e.act_id as "endActId"
  from record.draw d
  join public.person a on a.id = d.announced_by
  left join record.draw_end e on e.series_id = d.series_id and e.draw_id = d.id
  left join public.person b on b.id = e.ended_by`;

/** Draws of an event, or of one class of it, in the order announced. */
export const listDrawRows = (
  em: EntityManager,
  { seriesId, eventId, classId }: Omit<DrawSubject, 'classId'> & { readonly classId?: string },
): Promise<readonly DrawRow[]> =>
  em.execute<DrawRow[]>(
    `${SELECT} where d.series_id = ? and d.event_id = ? ${classId === undefined ? '' : 'and d.class_id = ?'}
     order by d.announced_at, d.received_at`,
    [seriesId, eventId, ...(classId === undefined ? [] : [classId])],
  );

export const findDrawRow = async (
  em: EntityManager,
  seriesId: string,
  id: string,
): Promise<DrawRow | undefined> => {
  const [row] = await em.execute<DrawRow[]>(`${SELECT} where d.series_id = ? and d.id = ?`, [
    seriesId,
    id,
  ]);
  return row;
};

const got = <T>(read: Result<T, Failure>): T => {
  if (!read.ok) throw new Error(`A stored draw cannot be read: ${read.failure.detail}`);
  return read.value;
};

/** Where the draw of a class stands, from the documents as published. */
export const stateOf = (rows: readonly DrawRow[]): DrawState =>
  rows
    .flatMap(({ document, end, endDocument }): DrawAct[] => [
      got(readDrawCommitment(document)),
      ...(endDocument === null
        ? []
        : [end === 'made' ? got(readDrawMade(endDocument)) : got(readDrawVoid(endDocument))]),
    ])
    .reduce<DrawState>((state, act) => got(nextDrawState(state, act)), { at: 'none' });

export const findDrawState = async (em: EntityManager, subject: DrawSubject): Promise<DrawState> =>
  stateOf(await listDrawRows(em, subject));
