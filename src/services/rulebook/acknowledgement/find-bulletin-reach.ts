import { type Actor, may } from '@/domain/access/permission';
import type { MailState } from '@/domain/mail/mail-state';
import type { Ports } from '../../ports';

export interface ReachedPerson {
  readonly personId: string;
  readonly name: string;
  /** Of the message that told them; nothing where there was none. */
  readonly mail: MailState | null;
  /** What the receiving server said, or why it did not go out. */
  readonly error: string | null;
  readonly sentAt: string | null;
  /** When, and by whose word; nothing while not. */
  readonly acknowledgedAt: string | null;
}

export interface ReachedEngine {
  readonly paperworkId: string;
  readonly carNumber: string;
  readonly name: string;
  readonly results: readonly {
    readonly clause: string;
    readonly heading: string;
    readonly sentence: string;
  }[];
  readonly owners: readonly ReachedPerson[];
}

export interface BulletinReach {
  readonly id: string;
  readonly number: number;
  readonly title: string;
  readonly hash: string;
  readonly publishedAt: string;
  /** Engines that it made illegal when it was published. */
  readonly engines: readonly ReachedEngine[];
  /** Everybody else who was told. */
  readonly others: readonly ReachedPerson[];
}

type PersonRow = ReachedPerson & { readonly paperworkId: string | null };

/** Whom a published bulletin reached: the engines that it made illegal, who was told, who has read it. */
export const findBulletinReach = async (
  deps: Pick<Ports, 'db'>,
  actor: Actor,
  asked: { readonly seriesId: string; readonly classId: string; readonly number: number },
): Promise<BulletinReach | undefined> => {
  const { seriesId, classId, number } = asked;
  if (!may(actor, 'rulebook.write', seriesId)) return undefined;
  const [bulletin] = await deps.db.execute<
    (Pick<BulletinReach, 'id' | 'title' | 'hash'> & { readonly published_at: Date })[]
  >(
    `select id, title, encode(hash, 'hex') as hash, published_at from record.rule_publication
     where series_id = ? and class_id = ? and kind = 'bulletin' and number = ?`,
    [seriesId, classId, number],
  );
  if (bulletin === undefined) return undefined;
  const { id, title, hash } = bulletin;
  const engines = await deps.db.execute<
    (Omit<ReachedEngine, 'owners' | 'results'> & { readonly results: string })[]
  >(
    `select paperwork_id as "paperworkId", car_number as "carNumber", name, results
     from record.bulletin_engine where series_id = ? and bulletin_id = ? order by car_number, name`,
    [seriesId, id],
  );
  const people = await deps.db.execute<
    (Omit<PersonRow, 'sentAt' | 'acknowledgedAt'> & {
      readonly sentAt: Date | null;
      readonly acknowledgedAt: Date | null;
    })[]
  >(
    `select t.paperwork_id as "paperworkId", p.id as "personId", p.name, m.state as mail,
       coalesce(m.answer, m.last_error) as error, m.sent_at as "sentAt",
       (select min(a.acknowledged_at) from record.bulletin_acknowledgement a
        where a.series_id = t.series_id and a.bulletin_id = t.bulletin_id and a.person_id = p.id)
         as "acknowledgedAt"
     from public.bulletin_mail t
     join public.person p on p.id = t.person_id
     left join public.mail m on m.id = t.mail_id
     where t.series_id = ? and t.bulletin_id = ? order by p.name, p.id`,
    [seriesId, id],
  );
  const told = people.map(({ paperworkId, ...person }) => ({
    paperworkId,
    person: {
      ...person,
      sentAt: person.sentAt && new Date(person.sentAt).toISOString(),
      acknowledgedAt: person.acknowledgedAt && new Date(person.acknowledgedAt).toISOString(),
    },
  }));
  return {
    id,
    number,
    title,
    hash,
    publishedAt: new Date(bulletin.published_at).toISOString(),
    engines: engines.map((engine) => ({
      ...engine,
      results: JSON.parse(engine.results) as ReachedEngine['results'],
      owners: told
        .filter((one) => one.paperworkId === engine.paperworkId)
        .map(({ person }) => person),
    })),
    others: told.filter((one) => one.paperworkId === null).map(({ person }) => person),
  };
};
