import type { ValuesRequest } from '@/contracts/draw/draw';
import { type Actor, may } from '@/domain/access/permission';
import type { DrawCommitment } from '@/domain/draw/documents';
import { makeDraw } from '@/domain/draw/make-draw';
import { findValueFault } from '@/domain/draw/values';
import { absent, type Failure, type Fault, failure, invalid } from '@/domain/failure';
import { fail, ok, type Result } from '@/domain/result';
import { performAct } from '../act/perform-act';
import type { Ports } from '../ports';
import { openSecret, takeOpenDraw, writeEnd } from './end-draw';

type Values = ValuesRequest['values'];

/** Every value at fault by its place, so that nothing is found out one at a time. */
const faultsOf = (announced: DrawCommitment['values'], values: Values): readonly Fault[] =>
  values.flatMap((value, i): Fault[] => {
    const rule = announced[i];
    if (rule === undefined) return [];
    const pointer = `/values/${i}/numbers`;
    if (value.source === 'missing' && rule.ifMissing === 'void')
      return [{ pointer, detail: 'Without this value the draw is void. Declare it void.' }];
    const detail = findValueFault([rule], [value]);
    return detail === undefined ? [] : [{ pointer, detail }];
  });

/**
 * Makes the draw: the values are entered, the secret comes out, and both are published and logged
 * with the result, in one act. Not before the session; once only.
 *
 * Inspections are opened by `pickDrawn`, an act of its own: a result must come out whatever stands
 * in the way of an inspection.
 */
export const publishDraw = async (
  deps: Pick<Ports, 'db' | 'clock' | 'random' | 'jobs'>,
  actor: Actor,
  input: ValuesRequest & { readonly seriesId: string; readonly drawId: string },
): Promise<Result<{ readonly document: string; readonly cars: readonly string[] }, Failure>> => {
  const { act, seriesId, drawId, values } = input;
  if (!may(actor, 'cars.pick', seriesId)) return fail(absent());
  return performAct(
    deps,
    actor,
    { id: act, kind: 'publish-draw', seriesId, input: { drawId, values } },
    async (inside) => {
      const open = await takeOpenDraw(inside.em, seriesId, drawId);
      if (!open.ok) return open;
      const { commitment } = open.value;
      if (inside.at.toISOString() < commitment.sessionAt)
        return fail(
          failure(
            'not-in-this-state',
            'The session has not begun: the values cannot be there yet. If it was moved forward, wait for the time announced.',
          ),
        );
      const faults = faultsOf(commitment.values, values);
      if (faults.length > 0) return fail(invalid(faults));
      const all = findValueFault(commitment.values, values);
      if (all !== undefined) return fail(invalid([{ pointer: '/values', detail: all }]));
      const secret = await openSecret(inside.em, seriesId, drawId);
      const made = makeDraw(commitment, secret, values);
      if (!made.ok) return made;
      const document = await writeEnd(inside, open.value, {
        seriesId,
        by: actor.personId,
        ended: made.value,
      });
      return ok({ document, cars: made.value.selected.map(({ car }) => car) });
    },
  );
};
