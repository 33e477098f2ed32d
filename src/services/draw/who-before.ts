import type { EntityManager } from '@mikro-orm/postgresql';
import { formatInZone } from '@/domain/deadline/format-in-zone';
import type { Event } from '@/entities/event/event';

/** Who announced or ended the last draw of a class, and when: for whoever pressed a moment later. */
export const whoBefore = async (
  em: EntityManager,
  event: Pick<Event, 'seriesId' | 'id' | 'zone'>,
  classId: string,
): Promise<string> => {
  const [row] = await em.execute<{ by: string; at: string; ended: string }[]>(
    `select p.name as by, coalesce(e.kind, '') as ended,
            to_char(coalesce(e.ended_at, d.announced_at) at time zone 'UTC', 'YYYY-MM-DD"T"HH24:MI:SS"Z"') as at
     from record.draw d
     left join record.draw_end e on e.series_id = d.series_id and e.draw_id = d.id
     join public.person p on p.id = coalesce(e.ended_by, d.announced_by)
     where d.series_id = ? and d.event_id = ? and d.class_id = ? order by d.announced_at desc limit 1`,
    [event.seriesId, event.id, classId],
  );
  if (row === undefined) return '';
  const did = { made: 'made', void: 'declared void' }[row.ended] ?? 'announced';
  return `It was ${did} by ${row.by}, ${formatInZone(row.at, event.zone)}.`;
};
