import { type Actor, rolesIn } from '@/domain/access/permission';
import { absent, type Failure, invalid } from '@/domain/failure';
import { fail, ok, type Result } from '@/domain/result';
import { RulesQuestion } from '@/entities/series/rules-question';
import { performAct } from '../../act/perform-act';
import { queueMail } from '../../mail/queue-mail';
import { officialsOf } from '../../people/officials-of';
import type { Ports } from '../../ports';
import { findRules } from '../find-rules';

const ASKERS = ['competitor', 'builder'];

/** Whether this person may ask the series a rules question. */
export const mayAsk = (actor: Actor | null, seriesId: string): boolean =>
  actor !== null && rolesIn(actor, seriesId).some((role) => ASKERS.includes(role));

/** Asks a rules question in writing against a clause; the officials are told. */
export const askQuestion = async (
  deps: Pick<Ports, 'db' | 'clock' | 'random' | 'jobs' | 'site'>,
  actor: Actor,
  input: {
    readonly act: string;
    readonly seriesId: string;
    readonly classId: string;
    readonly id: string;
    readonly clause: string;
    readonly question: string;
  },
): Promise<Result<{ readonly questionId: string }, Failure>> => {
  if (!mayAsk(actor, input.seriesId)) return fail(absent());
  const { act: actId, ...asked } = input;
  const { seriesId, classId, id, clause } = asked;
  const question = asked.question.trim();
  if (question === '' || question.length > 20_000) {
    return fail(invalid([{ pointer: '/question', detail: 'Write your question.' }]));
  }
  return performAct(
    deps,
    actor,
    { id: actId, kind: 'ask-rules-question', seriesId, input: asked },
    async ({ em, at, send }) => {
      const standing = await findRules(em, seriesId, classId, at);
      if (standing === undefined) return fail(absent());
      if (!standing.rules.clauses.some((one) => one.number === clause)) {
        return fail(
          invalid([{ pointer: '/clause', detail: `There is no clause ${clause} in force.` }]),
        );
      }
      em.persist(
        em.create(RulesQuestion, {
          seriesId,
          id,
          classId,
          clause,
          question,
          askedBy: actor.personId,
          askedAt: at,
          state: 'open',
          answer: '',
          version: 1,
        }),
      );
      for (const official of await officialsOf(em, seriesId)) {
        queueMail(
          deps,
          em,
          { send, at },
          {
            seriesId,
            personId: official.id,
            address: official.email,
            kind: 'rules-question',
            subject: `${standing.rules.className}: a question about clause ${clause}`,
            paragraphs: [`${actor.name} asks about clause ${clause}:`, question],
            next: 'answer it: to the asker alone, or as a clarification for everybody.',
            link: {
              label: 'Answer it',
              path: `/office/rulebooks/${classId}/questions/${id}`,
            },
          },
        );
      }
      return ok({ questionId: id });
    },
  );
};
