import type { EntityManager } from '@mikro-orm/postgresql';
import type { EntryRow } from '@/contracts/event/event';

interface Declared {
  readonly id: string;
  readonly class_id: string;
  readonly car_number: string;
  readonly competitor_id: string;
  readonly name: string;
  readonly email: string;
}

export const plain = (text: string): string => text.trim().toLowerCase();

/** Paperwork and people by which a car's competitor is known: by e-mail, else by its paperwork. */
export const knownBy = async (em: EntityManager, seriesId: string) => {
  const paperwork = await em.execute<Declared[]>(
    `select p.id, p.class_id, p.car_number, p.competitor_id, c.name, c.email
     from public.paperwork p join public.person c on c.id = p.competitor_id
     where p.series_id = ? and p.state <> 'withdrawn'`,
    [seriesId],
  );
  const people = await em.execute<{ id: string; email: string }[]>(
    `select distinct p.id, p.email from public.person p
     join public.membership m on m.person_id = p.id and m.ended_at is null where m.series_id = ?`,
    [seriesId],
  );
  return (row: EntryRow) => {
    const byMail = people.find((person) => person.email === plain(row.competitorEmail ?? ''));
    const papers = paperwork.filter(
      (paper) => paper.class_id === row.classId && paper.car_number === row.carNumber,
    );
    const paper = papers.find(
      (one) => one.competitor_id === byMail?.id || plain(one.name) === plain(row.competitorName),
    );
    return {
      competitorId: byMail?.id ?? paper?.competitor_id ?? null,
      paperworkId: paper?.id ?? null,
      unknownMail: plain(row.competitorEmail ?? '') !== '' && byMail === undefined,
    };
  };
};
