import { type Actor, may } from '@/domain/access/permission';
import { absent, type Failure, type Fault, invalid } from '@/domain/failure';
import { fail, ok, type Result } from '@/domain/result';
import type { Clarification } from '@/domain/rulebook/ruling';
import { type Act, performAct } from '../../act/perform-act';
import type { Ports } from '../../ports';
import { findRules } from '../find-rules';
import { appendPublication } from './append-publication';
import { takeNumber } from './next-number';

export interface NewClarification {
  readonly seriesId: string;
  readonly classId: string;
  readonly id: string;
  readonly clause: string;
  readonly question: string;
  readonly answer: string;
}

const blank = (text: string, pointer: string, detail: string): readonly Fault[] =>
  text.trim() === '' || text.length > 20_000 ? [{ pointer, detail }] : [];

/** The clarification inside an act that is under way: alone, or as the answer to a question. */
export const clarify = async (
  act: Act,
  actor: Actor,
  input: NewClarification,
): Promise<Result<{ readonly number: number; readonly hash: string }, Failure>> => {
  const { seriesId, classId } = input;
  const taken = await takeNumber(act.em, seriesId, classId, 'clarification');
  if (taken === undefined) return fail(absent());
  const standing = await findRules(act.em, seriesId, classId, act.at);
  const faults = [
    ...(standing?.rules.clauses.some((clause) => clause.number === input.clause)
      ? []
      : [{ pointer: '/clause', detail: `There is no clause ${input.clause} in force.` }]),
    ...blank(input.question, '/question', 'Write the question as it was asked.'),
    ...blank(input.answer, '/answer', 'Write the answer that everybody may rely on.'),
  ];
  if (faults.length > 0) return fail(invalid(faults));
  const content: Clarification = {
    id: input.id,
    number: taken.number,
    season: taken.season.name,
    clause: input.clause,
    question: input.question.trim(),
    answer: input.answer.trim(),
    publishedAt: act.at.toISOString(),
  };
  const hash = appendPublication(
    act,
    actor,
    seriesId,
    classId,
    { kind: 'clarification', content },
    { title: content.question.slice(0, 200), inForceAt: content.publishedAt },
  );
  return ok({ number: content.number, hash });
};

/** Publishes a numbered answer to a question about a clause; it counts from now on. */
export const publishClarification = async (
  deps: Pick<Ports, 'db' | 'clock' | 'random' | 'jobs'>,
  actor: Actor,
  input: NewClarification & { readonly act: string },
): Promise<Result<{ readonly number: number; readonly hash: string }, Failure>> => {
  if (!may(actor, 'rulebook.publish', input.seriesId)) return fail(absent());
  const { act: id, ...asked } = input;
  return performAct(
    deps,
    actor,
    { id, kind: 'publish-clarification', seriesId: input.seriesId, input: asked },
    (act) => clarify(act, actor, asked),
  );
};
