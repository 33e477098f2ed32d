import type { Ports } from '../ports';

/** An entry as everybody may see it: no person's name, no engine. */
export interface PublicEntry {
  readonly carNumber: string;
  readonly className: string;
  readonly position: number | null;
  readonly withdrawn: boolean;
  /** Why the car was picked for inspection; nothing where it was not. */
  readonly picked: string | null;
  readonly inspection: 'to-come' | 'under-way' | 'signed' | null;
  /** The latest notice on it. */
  readonly notice: string | null;
  readonly decision: 'breach' | 'no-breach' | null;
}

export interface PublicEvent {
  readonly id: string;
  readonly number: number;
  readonly slug: string;
  readonly name: string;
  readonly track: string;
  readonly zone: string;
  readonly startsAt: string;
  readonly results: 'none' | 'unofficial' | 'official';
  readonly entries: readonly PublicEntry[];
}

/** One event of a series; nothing for an unknown address. */
export const findPublicEvent = async (
  deps: Pick<Ports, 'db'>,
  input: { readonly seriesId: string; readonly event: string },
): Promise<PublicEvent | undefined> => {
  const [event] = await deps.db.execute<
    (Omit<PublicEvent, 'entries' | 'startsAt'> & { startsAt: Date })[]
  >(
    `select id, number, slug, name, track, zone, starts_at as "startsAt", results_state as results
     from public.event where series_id = ? and slug = ?`,
    [input.seriesId, input.event],
  );
  if (event === undefined) return undefined;
  const entries = await deps.db.execute<PublicEntry[]>(
    `select e.car_number as "carNumber", c.name as "className", e.position,
            e.state = 'withdrawn' as withdrawn, i.picked_because as picked,
            case when i.id is null then null
                 when exists (select 1 from record.report r where r.series_id = i.series_id and r.inspection_id = i.id) then 'signed'
                 when i.opened_at is null then 'to-come' else 'under-way' end as inspection,
            v.number as notice, v.decision
     from public.entry e
     join public.class c on c.series_id = e.series_id and c.id = e.class_id
     left join public.inspection i on i.series_id = e.series_id and i.entry_id = e.id
     left join lateral (
       select number, decision from record.verdict v where v.series_id = i.series_id
         and v.inspection_id = i.id order by report_revision desc limit 1
     ) v on true
     where e.series_id = ? and e.event_id = ?
     order by c.name, e.position nulls last, length(e.car_number), e.car_number`,
    [input.seriesId, event.id],
  );
  return { ...event, startsAt: new Date(event.startsAt).toISOString(), entries };
};
