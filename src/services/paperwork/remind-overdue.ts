import { ok } from '@/domain/result';
import { performAct } from '../act/perform-act';
import { queueMail } from '../mail/queue-mail';
import { actIdFor } from '../notice/act-id';
import type { Ports } from '../ports';
import { isoOf } from './read/read-row';

interface OverdueRow {
  readonly seriesId: string;
  readonly swapId: string;
  readonly paperworkId: string;
  readonly carNumber: string;
  readonly className: string;
  readonly seriesName: string;
  readonly engine: string;
  readonly eventName: string;
  readonly personId: string;
  readonly email: string;
  readonly dueAt: string;
}

/** Swaps whose day passed in the last week and whose paperwork was not handed in; older ones are known by then. */
const SELECT = `
select w.series_id as "seriesId", w.id as "swapId", p.id as "paperworkId",
  w.car_number as "carNumber", c.name as "className", s.name as "seriesName",
  w.to_reference as engine, v.name as "eventName", o.id as "personId", o.email,
  ${isoOf('w.due_at')} as "dueAt"
from record.engine_swap w
join public.paperwork p on p.series_id = w.series_id and p.id = w.paperwork_id
join public.class c on c.series_id = p.series_id and c.id = p.class_id
join public.series s on s.id = p.series_id
join public.event v on v.series_id = w.series_id and v.id = w.event_id
join public.person o on o.id = p.competitor_id
where p.state in ('draft', 'returned')
  and w.due_at <= ? and w.due_at > ?::timestamptz - interval '7 days'
order by w.due_at, w.id`;

/** Tells a competitor, once, that the day has passed on which the rest of a swapped engine's paperwork was due. */
export const remindOverdue = async (
  deps: Pick<Ports, 'db' | 'clock' | 'random' | 'jobs' | 'site'>,
): Promise<void> => {
  const now = deps.clock.now();
  const rows = await deps.db.execute<OverdueRow[]>(SELECT, [now, now]);
  for (const row of rows) {
    const { seriesId, swapId, paperworkId, carNumber, className, seriesName, engine } = row;
    const reminded = await performAct(
      deps,
      null,
      {
        id: actIdFor('remind-overdue', swapId),
        kind: 'remind-overdue',
        seriesId,
        input: { swapId },
      },
      async (act) => {
        queueMail(deps, act.em, act, {
          seriesId,
          personId: row.personId,
          address: row.email,
          kind: 'overdue',
          subject: `Overdue: paperwork for car ${carNumber}, ${className}`,
          paragraphs: [
            `Engine ${engine} went into car ${carNumber} at ${row.eventName}, ${seriesName}. The rest of its paperwork was due by ${row.dueAt} and is not handed in. The officials see it as overdue.`,
          ],
          next: 'hand it in now, or tell the race office why it takes longer.',
          link: { label: 'Go on with the paperwork', path: `/paddock/paperwork/${paperworkId}` },
        });
        return ok(null);
      },
    );
    if (!reminded.ok) throw new Error(reminded.failure.detail);
  }
};
