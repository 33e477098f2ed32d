import type { InterestKind } from '@/domain/access/interest-kind';
import { type Actor, may } from '@/domain/access/permission';
import { absent, type Failure, invalid } from '@/domain/failure';
import { canonicalJson } from '@/domain/ledger/canonical';
import { fail, ok, type Result } from '@/domain/result';
import { Interest } from '@/entities/event/interest';
import { performAct } from '../act/perform-act';
import type { Ports } from '../ports';

/**
 * Declares that an inspector has an interest in a competitor, or in a car by its number: from then on
 * they inspect neither. Everybody declares their own; the chief and officials for anybody.
 */
export const declareInterest = async (
  deps: Pick<Ports, 'db' | 'clock' | 'random' | 'jobs'>,
  actor: Actor,
  input: {
    readonly act: string;
    readonly seriesId: string;
    readonly id: string;
    readonly personId: string;
    readonly kind: InterestKind;
    readonly competitorId: string | null;
    readonly carNumber: string | null;
    readonly words: string;
  },
): Promise<Result<{ readonly id: string }, Failure>> => {
  const { act, seriesId, ...said } = input;
  const { personId, competitorId, carNumber } = said;
  const own = personId === actor.personId && may(actor, 'inspection.record', seriesId);
  if (!own && !may(actor, 'inspection.assign', seriesId)) return fail(absent());
  if ((competitorId === null) === (carNumber === null))
    return fail(
      invalid([
        { pointer: '/carNumber', detail: 'Name the competitor, or the car by its number.' },
      ]),
    );
  return performAct(
    deps,
    actor,
    { id: act, kind: 'declare-interest', seriesId, input: said },
    async ({ em, at, line }) => {
      const members = await em.execute<{ person_id: string; inspects: boolean }[]>(
        `select person_id, bool_or(role in ('inspector', 'chief-inspector')) as inspects
         from public.membership where series_id = ? and ended_at is null
           and person_id in (?, ?) group by person_id`,
        [seriesId, personId, competitorId ?? personId],
      );
      if (!members.some((one) => one.person_id === personId && one.inspects))
        return fail(invalid([{ pointer: '/personId', detail: 'Choose an inspector.' }]));
      if (competitorId !== null && !members.some((one) => one.person_id === competitorId))
        return fail(
          invalid([{ pointer: '/competitorId', detail: 'Choose a person of this series.' }]),
        );
      const row = {
        ...said,
        words: said.words.trim(),
        seriesId,
        declaredBy: actor.personId,
        declaredAt: at,
        endedAt: null,
      };
      em.persist(em.create(Interest, row));
      line({
        seriesId,
        kind: 'interest-declared',
        contents: {
          interest: {
            text: canonicalJson({
              v: '1',
              type: 'tagwire/interest',
              id: said.id,
              person: personId,
              kind: said.kind,
              words: row.words,
              by: actor.personId,
              ...(competitorId === null ? { car: carNumber } : { competitor: competitorId }),
            }),
            open: false,
          },
        },
      });
      return ok({ id: said.id });
    },
  );
};
