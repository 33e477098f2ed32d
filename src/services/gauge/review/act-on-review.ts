import type { ReviewRequest } from '@/contracts/gauge/check';
import { type Actor, may } from '@/domain/access/permission';
import { absent, type Failure, failure, invalid } from '@/domain/failure';
import { canonicalJson } from '@/domain/ledger/canonical';
import { fail, ok, type Result } from '@/domain/result';
import { beforeDeciding } from '@/domain/verdict/before-deciding';
import { performAct } from '../../act/perform-act';
import type { Ports } from '../../ports';
import { decidingBy, findCase } from '../../verdict/find-case';

interface Opened {
  readonly fault: string;
  readonly verdict: string;
  readonly number: string;
  readonly inspection: string;
  readonly kinds: readonly string[];
}

/**
 * An official makes a review public, or ends it: the verdict stands, or is to be decided again. Ending
 * changes no verdict; a new decision follows a corrected report, as always.
 */
export const actOnReview = async (
  deps: Pick<Ports, 'db' | 'clock' | 'random' | 'jobs'>,
  actor: Actor,
  input: ReviewRequest & { readonly seriesId: string; readonly reviewId: string },
): Promise<Result<{ readonly reviewId: string }, Failure>> => {
  const { act, seriesId, reviewId, to } = input;
  const reason = input.reason.trim();
  if (!may(actor, 'verdict.decide', seriesId)) return fail(absent());
  return performAct(
    deps,
    actor,
    { id: act, kind: 'act-on-review', seriesId, input: { reviewId, to, reason } },
    async ({ em, at, append, line }) => {
      // Two officials at once: one after the other.
      await em.execute('select 1 from public.series where id = ? for no key update', [seriesId]);
      const [opened] = await em.execute<Opened[]>(
        `select o.fault_id as fault, o.verdict_id as verdict, v.number,
                v.inspection_id as inspection, array(select a.kind from record.review_act a
                  where a.series_id = o.series_id and a.review_id = o.review_id) as kinds
         from record.review_act o
         join record.verdict v on v.series_id = o.series_id and v.id = o.verdict_id
         where o.series_id = ? and o.review_id::text = ? and o.kind = 'opened'`,
        [seriesId, reviewId],
      );
      if (opened === undefined) return fail(absent());
      const found = await findCase(em, seriesId, opened.inspection);
      const unmet =
        found &&
        beforeDeciding(decidingBy(found, actor.personId)).find(
          ({ key, met }) => !met && (key === 'not-yours' || key === 'no-interest'),
        );
      if (unmet !== undefined) return fail(failure('conflict-of-interest', unmet.words));
      if (opened.kinds.some((kind) => kind === 'stands' || kind === 'decide-again'))
        return fail(failure('not-in-this-state', 'This review has ended already.'));
      if (to === 'made-public' && opened.kinds.includes('made-public'))
        return fail(failure('not-in-this-state', 'This review is public already.'));
      if (to !== 'made-public' && reason === '')
        return fail(invalid([{ pointer: '/reason', detail: 'Write why.' }]));
      append('review_act', [
        {
          series_id: seriesId,
          id: deps.random.uuid(),
          review_id: reviewId,
          fault_id: opened.fault,
          verdict_id: opened.verdict,
          kind: to,
          reason,
          acted_at: at.toISOString(),
          recorded_by: actor.personId,
        },
      ]);
      const open = to === 'made-public' || opened.kinds.includes('made-public');
      line({
        seriesId,
        kind: 'verdict-review',
        contents: {
          review: {
            text: canonicalJson({
              document: 'tagwire/verdict-review',
              version: '1',
              review: reviewId,
              notice: opened.number,
              state: to,
              at: at.toISOString(),
            }),
            open,
          },
          reason: { text: canonicalJson({ reason, by: actor.personId }), open: false },
        },
        refs: { verdict: opened.verdict, inspection: opened.inspection },
      });
      return ok({ reviewId });
    },
  );
};
