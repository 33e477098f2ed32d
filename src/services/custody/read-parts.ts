import type { EntityManager } from '@mikro-orm/postgresql';
import { type Custody, type CustodyAct, custodyOf } from '@/domain/inspection/custody/chain';
import type { HeldPart } from '@/domain/inspection/custody/tag';

/** A held part with its history. */
export interface PartKept extends HeldPart {
  readonly id: string;
  readonly seriesId: string;
  readonly series: string;
  readonly zone: string;
  readonly className: string;
  readonly inspectionId: string | null;
  readonly holdUntil: string | null;
  /** End of the latest appeal window of a verdict on its inspection; nothing while none is published. */
  readonly appealUntil: string | null;
  readonly custody: Custody;
  /** What was written beside each act, by its id. */
  readonly said: ReadonlyMap<string, { readonly place: string; readonly reason: string }>;
  /** Where it was last said to be. */
  readonly place: string;
}

interface ActRow {
  readonly id: string;
  readonly part: string;
  readonly kind: CustodyAct['kind'];
  readonly giver: string;
  readonly receiver: string;
  readonly witness: string;
  readonly bag: string;
  readonly place: string;
  readonly reason: string;
  readonly at: string;
}

const actOf = ({ kind, giver, receiver, witness, bag, place, reason }: ActRow): CustodyAct => {
  switch (kind) {
    case 'taken':
      return { kind, from: giver, by: receiver, place };
    case 'hand-over':
      return { kind, from: giver, to: receiver, reason, place };
    case 'bag-opened':
      return { kind, by: giver, witness, reason, bag };
    case 'bag-closed':
      return { kind, by: giver, bag };
    case 'returned':
      return { kind, from: giver, to: receiver };
  }
};

const iso = (column: string): string =>
  `to_char(${column} at time zone 'UTC', 'YYYY-MM-DD"T"HH24:MI:SS.MS"Z"')`;

type PartRow = Omit<PartKept, 'custody' | 'said' | 'place' | 'takenFrom' | 'takenBy'>;

/** The parts that a condition on `h` (`record.held_part`) names, the newest tag first, each with its chain. */
const readParts = async (
  em: EntityManager,
  condition: string,
  values: readonly unknown[],
): Promise<readonly PartKept[]> => {
  const parts = await em.execute<PartRow[]>(
    `select h.id, h.series_id as "seriesId", s.name as series, h.tag, h.kind,
            h.car_number as "carNumber", h.words, h.place_on_engine as "placeOnEngine", h.clause,
            h.bag, h.inspection_id as "inspectionId", encode(h.hash, 'hex') as hash,
            ${iso('h.taken_at')} as "takenAt", ${iso('h.hold_until')} as "holdUntil",
            coalesce(v.zone, s.zone) as zone, coalesce(v.name, '') as event,
            coalesce(c.name, '') as "className",
            (select max(w.notice::jsonb #>> '{appeal,until}') from record.verdict w
             where w.series_id = h.series_id and w.inspection_id = h.inspection_id) as "appealUntil"
     from record.held_part h
     join public.series s on s.id = h.series_id
     left join public.event v on v.series_id = h.series_id and v.id = h.event_id
     left join public.inspection i on i.series_id = h.series_id and i.id = h.inspection_id
     left join public.entry e on e.series_id = i.series_id and e.id = i.entry_id
     left join public.class c on c.series_id = e.series_id and c.id = e.class_id
     where ${condition} order by h.tag desc limit 500`,
    [...values],
  );
  if (parts.length === 0) return [];
  const acts = await em.execute<ActRow[]>(
    `select id, part_id as part, kind, giver, receiver, witness, bag, place, reason,
            ${iso('occurred_at')} as at
     from record.custody_act where part_id = any(?::uuid[]) order by occurred_at, id`,
    [`{${parts.map(({ id }) => id).join()}}`],
  );
  return parts.map((part): PartKept => {
    const own = acts.filter((row) => row.part === part.id);
    const taken = own.find(({ kind }) => kind === 'taken');
    return {
      ...part,
      takenFrom: taken?.giver ?? '',
      takenBy: taken?.receiver ?? '',
      custody: custodyOf(
        part.tag,
        own.map((row) => ({ id: row.id, tag: part.tag, at: row.at, act: actOf(row) })),
      ),
      said: new Map(own.map(({ id, place, reason }) => [id, { place, reason }])),
      place: own.findLast(({ place }) => place !== '')?.place ?? '',
    };
  });
};

export const readPartsOf = (em: EntityManager, seriesId: string, inspectionId: string) =>
  readParts(em, 'h.series_id = ? and h.inspection_id = ?', [seriesId, inspectionId]);

export const readPartsIn = (em: EntityManager, series: readonly string[]) =>
  series.length === 0
    ? Promise.resolve([])
    : readParts(em, `h.series_id in (${series.map(() => '?').join(', ')})`, series);

export const readPart = async (em: EntityManager, series: readonly string[], id: string) =>
  series.length === 0
    ? undefined
    : (
        await readParts(em, `h.id = ? and h.series_id in (${series.map(() => '?').join(', ')})`, [
          id,
          ...series,
        ])
      )[0];
