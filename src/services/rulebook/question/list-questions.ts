import { type Actor, may } from '@/domain/access/permission';
import type { Ports } from '../../ports';

export interface QuestionListed {
  readonly id: string;
  readonly clause: string;
  readonly question: string;
  readonly askedBy: string;
  readonly askedAt: string;
  readonly state: 'open' | 'answered' | 'clarified';
  readonly answer: string;
  /** The clarification's number, where it became one. */
  readonly clarification: number | null;
}

/** Questions of a class, the open ones first: all for those who answer, their own for those who ask. */
export const listQuestions = async (
  deps: Pick<Ports, 'db'>,
  actor: Actor,
  seriesId: string,
  classId: string,
): Promise<readonly QuestionListed[]> => {
  const all = may(actor, 'rulebook.write', seriesId);
  const rows = await deps.db.execute<(QuestionListed & { readonly asked_at: Date })[]>(
    `select q.id, q.clause, q.question, p.name as "askedBy", q.asked_at, q.state, q.answer,
            c.number as clarification
     from public.rules_question q
     join public.person p on p.id = q.asked_by
     left join record.rule_publication c on c.series_id = q.series_id and c.id = q.clarification_id
     where q.series_id = ? and q.class_id = ? and (? or q.asked_by = ?)
     order by q.state = 'open' desc, q.asked_at desc`,
    [seriesId, classId, all, actor.personId],
  );
  return rows.map(({ asked_at, ...row }) => ({
    ...row,
    askedAt: new Date(asked_at).toISOString(),
  }));
};
