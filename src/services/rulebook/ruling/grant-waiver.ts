import { type Actor, may } from '@/domain/access/permission';
import { absent, type Failure, type Fault, invalid } from '@/domain/failure';
import { fail, ok, type Result } from '@/domain/result';
import type { Waiver } from '@/domain/rulebook/ruling';
import { performAct } from '../../act/perform-act';
import type { Ports } from '../../ports';
import { findRules } from '../find-rules';
import { appendPublication } from './append-publication';
import { takeNumber } from './next-number';

export interface NewWaiver {
  readonly seriesId: string;
  readonly classId: string;
  readonly id: string;
  readonly clause: string;
  readonly for: Waiver['for'];
  readonly words: string;
  readonly reason: string;
  /** ISO 8601 instants in UTC; the last one no longer counts. */
  readonly fromAt: string;
  readonly untilAt: string;
}

const when = (wrong: boolean, pointer: string, detail: string): readonly Fault[] =>
  wrong ? [{ pointer, detail }] : [];

const holderWords = (holder: Waiver['for']): string =>
  holder.kind === 'car' ? `car ${holder.carNumber}` : `engine ${holder.engineName}`;

const ownFaults = (input: NewWaiver): readonly Fault[] => {
  const holder = input.for;
  const from = Date.parse(input.fromAt);
  const until = Date.parse(input.untilAt);
  return [
    ...when(
      holder.kind === 'car' && !/^[0-9A-Z]{1,6}$/.test(holder.carNumber),
      '/carNumber',
      'A car number is up to six digits and capital letters, such as 12J.',
    ),
    ...when(input.words.trim() === '', '/words', 'Say what is allowed instead.'),
    ...when(input.reason.trim() === '', '/reason', 'Say why: the reason is published.'),
    ...when(Number.isNaN(from), '/fromAt', 'Say from when the waiver counts.'),
    ...when(!(until > from), '/untilAt', 'Say until when: a waiver ends, and after it began.'),
  ];
};

/** Grants a dated exception from one clause to one car or engine; it is public from the start. */
export const grantWaiver = async (
  deps: Pick<Ports, 'db' | 'clock' | 'random' | 'jobs'>,
  actor: Actor,
  input: NewWaiver & { readonly act: string },
): Promise<Result<{ readonly number: number; readonly hash: string }, Failure>> => {
  if (!may(actor, 'rulebook.publish', input.seriesId)) return fail(absent());
  const { act: id, ...asked } = input;
  const { seriesId, classId } = asked;
  return performAct(
    deps,
    actor,
    { id, kind: 'grant-waiver', seriesId, input: asked },
    async (act) => {
      const { em, at } = act;
      const taken = await takeNumber(em, seriesId, classId, 'waiver');
      if (taken === undefined) return fail(absent());
      const standing = await findRules(em, seriesId, classId, at);
      const known = standing?.rules.clauses.some((clause) => clause.number === asked.clause);
      const holder = asked.for;
      const engines =
        holder.kind === 'engine'
          ? await em.execute<{ id: string }[]>(
              'select id from public.paperwork where series_id = ? and class_id = ? and engine_id::text = ?',
              [seriesId, classId, holder.engineId],
            )
          : [];
      const faults = [
        ...when(!known, '/clause', `There is no clause ${asked.clause} in force.`),
        ...when(
          holder.kind === 'engine' && engines.length === 0,
          '/engineId',
          'No paperwork of this class declares that engine.',
        ),
        ...ownFaults(asked),
      ];
      if (faults.length > 0) return fail(invalid(faults));
      const content: Waiver = {
        id: asked.id,
        number: taken.number,
        season: taken.season.name,
        clause: asked.clause,
        for: holder,
        words: asked.words.trim(),
        reason: asked.reason.trim(),
        // A waiver never reaches back before it was granted.
        fromAt: new Date(Math.max(at.getTime(), Date.parse(asked.fromAt))).toISOString(),
        untilAt: new Date(asked.untilAt).toISOString(),
      };
      if (content.untilAt <= content.fromAt) {
        return fail(invalid([{ pointer: '/untilAt', detail: 'This would have ended already.' }]));
      }
      const hash = appendPublication(
        act,
        actor,
        seriesId,
        classId,
        { kind: 'waiver', content },
        { title: `Clause ${asked.clause}, ${holderWords(holder)}`, inForceAt: content.fromAt },
      );
      return ok({ number: content.number, hash });
    },
  );
};
