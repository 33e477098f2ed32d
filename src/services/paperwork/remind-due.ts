import { ok } from '@/domain/result';
import { performAct } from '../act/perform-act';
import { queueMail } from '../mail/queue-mail';
import { actIdFor } from '../notice/act-id';
import type { Ports } from '../ports';
import { isoOf } from './read/read-row';

interface DueRow {
  readonly seriesId: string;
  readonly paperworkId: string;
  readonly carNumber: string;
  readonly className: string;
  readonly seriesName: string;
  readonly state: 'draft' | 'returned';
  readonly personId: string;
  readonly email: string;
  readonly dueAt: string;
  /** `the start of Round 2` */
  readonly dueFor: string;
}

/**
 * Paperwork with its competitor whose event begins within a day, or the rest of which is due soon after a
 * change of engine: within a day, or within half a day where the class gives no more than one. A
 * draft counts where the car is entered.
 */
const SELECT = `
select p.series_id as "seriesId", p.id as "paperworkId", p.car_number as "carNumber",
  c.name as "className", s.name as "seriesName", p.state, o.id as "personId", o.email,
  ${isoOf('due.at')} as "dueAt", due.what as "dueFor"
from public.paperwork p
join public.series s on s.id = p.series_id
join public.class c on c.series_id = p.series_id and c.id = p.class_id
join public.person o on o.id = p.competitor_id
join lateral (
  select v.starts_at as at, v.starts_at - interval '1 day' as from_at,
    'the start of ' || v.name as what from public.event v
  where v.series_id = p.series_id and v.season_id = c.season_id and (p.state = 'returned' or exists (
    select from public.entry e where e.series_id = v.series_id and e.event_id = v.id
      and e.class_id = p.class_id and e.competitor_id = p.competitor_id and e.state = 'entered'))
  union all
  select w.due_at, w.due_at - least(interval '1 day', make_interval(hours => c.swap_due_days * 12)),
    'the day that was set when the engine was changed' from record.engine_swap w
  where w.series_id = p.series_id and w.paperwork_id = p.id
) due on due.at > ? and due.from_at <= ?
where p.state in ('draft', 'returned')
order by due.at, p.id`;

/** Tells competitors a day before, at the most, that paperwork of theirs is still to be handed in; of each day once. */
export const remindDue = async (
  deps: Pick<Ports, 'db' | 'clock' | 'random' | 'jobs' | 'site'>,
): Promise<void> => {
  const now = deps.clock.now();
  const rows = await deps.db.execute<DueRow[]>(SELECT, [now, now]);
  for (const row of rows) {
    const { seriesId, paperworkId, carNumber, className, seriesName, state, dueAt, dueFor } = row;
    const reminded = await performAct(
      deps,
      null,
      {
        id: actIdFor('remind-due', `${paperworkId} ${dueAt}`),
        kind: 'remind-due',
        seriesId,
        input: { paperworkId, dueAt },
      },
      async (act) => {
        queueMail(deps, act.em, act, {
          seriesId,
          personId: row.personId,
          address: row.email,
          kind: 'due-soon',
          subject: `Due soon: paperwork for car ${carNumber}, ${className}`,
          paragraphs: [
            `Your paperwork for car ${carNumber} in ${className}, ${seriesName}, ${state === 'returned' ? 'came back with remarks and is not handed in again' : 'is not handed in'}. It is due by ${dueFor}, ${dueAt}.`,
          ],
          next:
            state === 'returned'
              ? 'put right what the remarks say and hand it in again.'
              : 'fill in what is missing and hand it in.',
          link: { label: 'Go on with the paperwork', path: `/paddock/paperwork/${paperworkId}` },
        });
        return ok(null);
      },
    );
    if (!reminded.ok) throw new Error(reminded.failure.detail);
  }
};
