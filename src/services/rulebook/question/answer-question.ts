import { LockMode } from '@mikro-orm/core';
import { type Actor, may } from '@/domain/access/permission';
import { absent, type Failure, failure, invalid } from '@/domain/failure';
import { fail, ok, type Result } from '@/domain/result';
import { Person } from '@/entities/people/person';
import { RaceClass } from '@/entities/series/race-class';
import { RulesQuestion } from '@/entities/series/rules-question';
import { Series } from '@/entities/series/series';
import { performAct } from '../../act/perform-act';
import { queueMail } from '../../mail/queue-mail';
import type { Ports } from '../../ports';
import { clarify } from '../ruling/publish-clarification';

/**
 * Answers a rules question: privately, or as a numbered clarification for everybody. Once only.
 * A clarification may state the question in the officials' words, without what tells who asked.
 */
export const answerQuestion = async (
  deps: Pick<Ports, 'db' | 'clock' | 'random' | 'jobs' | 'site'>,
  actor: Actor,
  input: {
    readonly act: string;
    readonly seriesId: string;
    readonly questionId: string;
    readonly answer: string;
    /** The clarification's id and the question as it is published; `null` answers privately. */
    readonly publish: { readonly id: string; readonly question: string } | null;
  },
): Promise<Result<{ readonly clarification: number | null }, Failure>> => {
  const permission = input.publish === null ? 'rulebook.write' : 'rulebook.publish';
  if (!may(actor, permission, input.seriesId)) return fail(absent());
  const { act: id, seriesId, questionId, publish } = input;
  const answer = input.answer.trim();
  if (answer === '' || answer.length > 20_000) {
    return fail(invalid([{ pointer: '/answer', detail: 'Write the answer.' }]));
  }
  return performAct(
    deps,
    actor,
    { id, kind: 'answer-rules-question', seriesId, input: { questionId, answer, publish } },
    async (act) => {
      const { em, at } = act;
      const question = await em.findOne(
        RulesQuestion,
        { seriesId, id: questionId },
        { lockMode: LockMode.PESSIMISTIC_WRITE },
      );
      if (question === null) return fail(absent());
      if (question.state !== 'open') {
        return fail(failure('not-in-this-state', 'This question has been answered already.'));
      }
      const { classId, clause } = question;
      const clarified =
        publish &&
        (await clarify(act, actor, {
          seriesId,
          classId,
          id: publish.id,
          clause,
          question: publish.question,
          answer,
        }));
      if (clarified && !clarified.ok) return clarified;
      const number = clarified?.value.number ?? null;
      question.state = publish === null ? 'answered' : 'clarified';
      question.answer = answer;
      question.answeredBy = actor.personId;
      question.answeredAt = at;
      question.clarificationId = publish?.id ?? null;
      const asker = await em.findOneOrFail(Person, { id: question.askedBy });
      const raceClass = await em.findOneOrFail(RaceClass, { seriesId, id: classId });
      const series = await em.findOneOrFail(Series, { id: seriesId });
      queueMail(deps, em, act, {
        seriesId,
        personId: asker.id,
        address: asker.email,
        kind: 'rules-answer',
        subject: `${raceClass.name}: your question about clause ${clause}`,
        paragraphs: [
          `You asked: ${question.question}`,
          `The answer: ${answer}`,
          number === null
            ? 'This answer is to you alone and changes no rule.'
            : `It is published as clarification ${number} and holds for everybody.`,
        ],
        next: 'nothing to do, unless your engine is affected: then change its paperwork.',
        link: {
          label: `Read clause ${clause}`,
          path: `/series/${series.slug}/rulebooks/${raceClass.slug}/clauses/${clause}`,
        },
      });
      return ok({ clarification: number });
    },
  );
};
