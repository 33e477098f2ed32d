import type { Actor } from '@/domain/access/permission';
import { absent, type Failure } from '@/domain/failure';
import { MAIL_TOPICS } from '@/domain/mail/mail-topics';
import { fail, ok, type Result } from '@/domain/result';
import { performAct } from '../act/perform-act';
import type { Ports } from '../ports';
import { tokenHash } from '../session/token';

export interface TopicShown {
  readonly id: string;
  readonly title: string;
  readonly explanation: string;
  readonly on: boolean;
}

const topicsOff = async (db: Ports['db'], personId: string): Promise<ReadonlySet<string>> => {
  const rows = await db.execute<{ topic: string }[]>(
    'select topic from public.mail_turned_off where person_id = ?',
    [personId],
  );
  return new Set(rows.map(({ topic }) => topic));
};

/** Those that can come to this person at all. */
const topicsFor = ({ standings }: Actor) =>
  MAIL_TOPICS.filter(({ to }) => standings.some(({ role }) => to.includes(role)));

/** The optional messages, and which of them this person gets. */
export const listTopics = async (
  { db }: Pick<Ports, 'db'>,
  actor: Actor,
): Promise<readonly TopicShown[]> => {
  const off = await topicsOff(db, actor.personId);
  return topicsFor(actor).map(({ id, title, explanation }) => ({
    id,
    title,
    explanation,
    on: !off.has(id),
  }));
};

/** Keeps which optional messages this person gets; those that are not named are turned off. */
export const chooseTopics = async (
  deps: Pick<Ports, 'db' | 'clock' | 'random' | 'jobs'>,
  actor: Actor,
  input: { readonly act: string; readonly on: readonly string[] },
): Promise<Result<{ readonly off: readonly string[] }, Failure>> => {
  const { act: id, on } = input;
  const own = topicsFor(actor).map((topic) => topic.id);
  const off = own.filter((topic) => !on.includes(topic));
  return performAct(
    deps,
    actor,
    { id, kind: 'choose-mail', seriesId: null, input: { off } },
    async ({ em, at }) => {
      await em.execute(
        'delete from public.mail_turned_off where person_id = ? and topic = any(?::text[])',
        [actor.personId, `{${own.join()}}`],
      );
      for (const topic of off)
        await em.execute(
          'insert into public.mail_turned_off (person_id, topic, since) values (?, ?, ?)',
          [actor.personId, topic, at],
        );
      return ok({ off });
    },
  );
};

const findLink = async (db: Ports['db'], token: string) => {
  const [link] = await db.execute<{ personId: string; topic: string }[]>(
    'select person_id as "personId", topic from public.mail_off_link where token_hash = ?',
    [tokenHash(token)],
  );
  const topic = MAIL_TOPICS.find(({ id }) => id === link?.topic);
  return link && topic && { ...link, topic };
};

/** What a link out of a message turns off; nothing where there is no such link. */
export const findTopicOfLink = async (
  { db }: Pick<Ports, 'db'>,
  token: string,
): Promise<{ readonly title: string; readonly off: boolean } | undefined> => {
  const link = await findLink(db, token);
  if (link === undefined) return undefined;
  const off = await topicsOff(db, link.personId);
  return { title: link.topic.title, off: off.has(link.topic.id) };
};

/** Turns one kind off for whom the message was for, without a sign-in; twice is once. */
export const turnOffByLink = async (
  deps: Pick<Ports, 'db' | 'clock' | 'random' | 'jobs'>,
  token: string,
): Promise<Result<{ readonly title: string }, Failure>> => {
  const link = await findLink(deps.db, token);
  if (link === undefined) return fail(absent());
  const { personId, topic } = link;
  return performAct(
    deps,
    null,
    { id: deps.random.uuid(), kind: 'turn-off-mail', seriesId: null, input: { topic: topic.id } },
    async ({ em, at }) => {
      await em.execute(
        `insert into public.mail_turned_off (person_id, topic, since) values (?, ?, ?)
         on conflict do nothing`,
        [personId, topic.id, at],
      );
      return ok({ title: topic.title });
    },
  );
};
