import type { EntityManager } from '@mikro-orm/postgresql';
import {
  type SealAct,
  type SealHistory,
  type SealRow,
  sealHistoryOf,
} from '@/domain/inspection/custody/seals';

export interface SealsKept extends SealHistory {
  readonly engine: string;
  readonly rows: readonly (SealRow & {
    readonly doneBy: string;
    readonly note: string;
    readonly event: string;
  })[];
}

interface Row {
  readonly id: string;
  readonly kind: SealAct['kind'];
  readonly number: string;
  readonly place: string;
  readonly state: Extract<SealAct, { kind: 'found' }>['state'] | null;
  readonly doneBy: string;
  readonly note: string;
  readonly event: string;
  readonly at: string;
}

const actOf = ({ kind, number, place, state, doneBy }: Row): SealAct =>
  kind === 'found'
    ? { kind, number, place, state: state ?? 'missing' }
    : { kind, number, place, by: doneBy };

/** Under what an inspected engine's seals are kept: its id where it was declared, else its name. */
export const findEngineKey = async (
  em: EntityManager,
  seriesId: string,
  inspectionId: string,
): Promise<string> => {
  const [row] = await em.execute<{ engine: string }[]>(
    `select coalesce(w.document::jsonb #>> '{engine,id}', nullif(e.engine_reference, ''),
                     'car ' || e.car_number) as engine
     from public.inspection i
     join public.entry e on e.series_id = i.series_id and e.id = i.entry_id
     left join record.paperwork_version w on w.series_id = i.series_id
       and w.paperwork_id = i.paperwork_id and w.number = i.paperwork_number
     where i.series_id = ? and i.id = ?`,
    [seriesId, inspectionId],
  );
  if (row === undefined) throw new Error(`There is no inspection ${inspectionId}.`);
  return row.engine;
};

/** Every act on the seals of an engine, whichever inspection it was recorded at. */
export const readSeals = async (
  em: EntityManager,
  seriesId: string,
  engine: string,
): Promise<SealsKept> => {
  const rows = await em.execute<Row[]>(
    `select a.id, a.kind, a.number, a.place, a.state, a.done_by as "doneBy", a.note,
            coalesce(v.name, '') as event,
            to_char(a.occurred_at at time zone 'UTC', 'YYYY-MM-DD"T"HH24:MI:SS.MS"Z"') as at
     from record.seal_act a
     left join public.inspection i on i.series_id = a.series_id and i.id = a.inspection_id
     left join public.event v on v.series_id = i.series_id and v.id = i.event_id
     where a.series_id = ? and a.engine = ? order by a.occurred_at, a.id`,
    [seriesId, engine],
  );
  const acts = rows.map((row) => ({
    id: row.id,
    at: row.at,
    act: actOf(row),
    doneBy: row.doneBy,
    note: row.note,
    event: row.event,
  }));
  return { engine, rows: acts, ...sealHistoryOf(acts) };
};
