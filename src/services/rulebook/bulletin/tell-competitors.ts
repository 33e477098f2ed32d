import { formatInZone } from '@/domain/deadline/format-in-zone';
import type { Bulletin } from '@/domain/rulebook/bulletin';
import type { FailedCase } from '@/domain/rulebook/trial/try-rules';
import type { RaceClass } from '@/entities/series/race-class';
import { Series } from '@/entities/series/series';
import type { Act } from '../../act/perform-act';
import { queueMail } from '../../mail/queue-mail';
import type { Ports } from '../../ports';
import type { BulletinChecked } from './check-bulletin';
import type { AcceptedEngine } from './past-cases';

interface Told {
  readonly personId: string;
  readonly email: string;
}

/** Everybody with paperwork in the class, or entered in it for an event that is not over. */
const readConcerned = ({ em, at }: Act, seriesId: string, classId: string) =>
  em.execute<Told[]>(
    `with asked as (select ?::uuid as series_id, ?::uuid as class_id),
     paper as (
       select w.competitor_id, g.owner_id from public.paperwork w
       join asked using (series_id, class_id) join public.engine g on g.id = w.engine_id
       where w.state <> 'withdrawn'
     )
     select p.id as "personId", p.email from public.person p where p.id in (
       select competitor_id from paper union select owner_id from paper
       union
       select n.competitor_id from public.entry n
       join asked using (series_id, class_id)
       join public.event e on e.series_id = n.series_id and e.id = n.event_id
       where n.state = 'entered' and e.ends_at >= ?
     ) order by p.id`,
    [seriesId, classId, at],
  );

/**
 * Tells the owners of engines that a bulletin makes illegal, each with clause and sentence, and
 * everybody else who races in the class that there is one to read. Which message told whom is kept.
 */
export const tellCompetitors = async (
  deps: Pick<Ports, 'random' | 'site'>,
  act: Act,
  input: {
    readonly seriesId: string;
    readonly raceClass: RaceClass;
    readonly bulletin: Bulletin;
    readonly checked: Pick<BulletinChecked, 'affected' | 'countsFrom' | 'trial'>;
  },
): Promise<void> => {
  const { em } = act;
  const { seriesId, raceClass, bulletin, checked } = input;
  const { number, title, reason } = bulletin;
  const series = await em.findOneOrFail(Series, { id: seriesId });
  const from =
    checked.countsFrom === undefined
      ? 'from the next event'
      : `from ${formatInZone(checked.countsFrom, series.zone)}`;
  const path = `/series/${series.slug}/rulebooks/${raceClass.slug}/bulletins/${number}`;
  const news = [
    `${series.name} published bulletin ${number}, ${title}, for ${raceClass.name}. It counts ${from}.`,
    `Reason: ${reason}`,
  ];
  const ask = `Please say in the paddock that you have read it, or at sign-on.`;
  const told: (readonly [mailId: string, personId: string, paperworkId: string | null])[] = [];
  const tell = (
    { personId, email }: Told,
    mail: Pick<Parameters<typeof queueMail>[3], 'kind' | 'subject' | 'paragraphs'>,
    paperworkId: string | null,
  ) => {
    const link = { label: 'Read the bulletin', path };
    const mailId = queueMail(deps, em, act, {
      seriesId,
      personId,
      address: email,
      next: 'read the bulletin, and say that you have.',
      link,
      ...mail,
    });
    told.push([mailId, personId, paperworkId]);
  };
  const results = (engine: AcceptedEngine): FailedCase['results'] =>
    checked.trial?.failed.find((one) => one.id === engine.id)?.results ?? [];
  for (const engine of checked.affected) {
    const mail = {
      kind: 'bulletin-affects-engine',
      subject: `${raceClass.name}: bulletin ${number} affects ${engine.name}`,
      paragraphs: [
        ...news,
        `As declared, ${engine.name} would then no longer comply:`,
        ...results(engine).map((one) => `Clause ${one.clause}, ${one.heading}: ${one.sentence}`),
        ask,
      ],
    };
    for (const owner of engine.owners) tell(owner, mail, engine.id);
  }
  const known = new Set(told.map(([, personId]) => personId));
  for (const person of await readConcerned(act, seriesId, raceClass.id)) {
    if (known.has(person.personId)) continue;
    const subject = `${raceClass.name}: bulletin ${number}, ${title}`;
    tell(person, { kind: 'bulletin-published', subject, paragraphs: [...news, ask] }, null);
  }
  if (told.length === 0) return;
  await em.execute(
    `insert into public.bulletin_mail (series_id, bulletin_id, mail_id, person_id, paperwork_id)
     select ?, ?, (t ->> 0)::uuid, (t ->> 1)::uuid, (t ->> 2)::uuid from jsonb_array_elements(?::jsonb) t`,
    [seriesId, bulletin.id, JSON.stringify(told)],
  );
};
