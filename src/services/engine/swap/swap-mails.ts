import type { Act } from '../../act/perform-act';
import { queueMail } from '../../mail/queue-mail';
import type { Ports } from '../../ports';
import type { SwappableEntry } from './find-swappable';

/** Tells the series' officials and the competitor. */
export const swapMails = async (
  deps: Pick<Ports, 'random' | 'site'>,
  act: Act,
  { seriesId, competitorId, carNumber, className, eventName }: SwappableEntry,
  swap: {
    readonly from: string;
    readonly to: string;
    readonly seal: string;
    readonly dueAt: string;
  },
): Promise<void> => {
  const people = await act.em.execute<{ id: string; email: string; official: boolean }[]>(
    `select p.id, p.email, bool_or(m.role = 'official') as official
     from public.person p join public.membership m on m.person_id = p.id and m.ended_at is null
     where m.series_id = ? and (m.role = 'official' or p.id = ?) group by p.id, p.email`,
    [seriesId, competitorId],
  );
  for (const { id, email, official } of people) {
    queueMail(deps, act.em, act, {
      seriesId,
      personId: id,
      address: email,
      kind: 'engine-swapped',
      subject: `Car ${carNumber}: engine ${swap.to} goes in`,
      paragraphs: [
        `At ${eventName}, ${className}, engine ${swap.to} went into car ${carNumber}${swap.from === '' ? '' : ` in place of ${swap.from}`}. Seal ${swap.seal}.`,
        `The rest of its paperwork is due by ${swap.dueAt}.`,
      ],
      next: official
        ? 'look at the swap; the rest of the paperwork comes to be checked.'
        : 'hand the rest of its paperwork in by that day.',
      link: official
        ? { label: 'See the engines swapped', path: '/office/paperwork' }
        : { label: 'Go on with the paperwork', path: '/paddock' },
    });
  }
};
