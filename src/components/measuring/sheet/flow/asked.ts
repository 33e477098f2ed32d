import type { Extent } from '@/domain/inspection/plan/places';
import { type Ask, findAsk } from '@/domain/inspection/plan/plan';
import type { BorePosition } from '@/domain/tappet/layout/bore-layout';
import { boreName } from '@/domain/tappet/layout/bore-layout';
import { cellsFor, type Part } from '../parts';
import type { SetUp } from '../set-up';
import type { Asked, Leads } from './taken';

/** How facts and results name the place of a part that is read at a bore. */
export const keyOf = (part: Pick<Part, 'per'>, position: BorePosition): string => {
  if (part.per === 'bore') return boreName(position);
  return part.per === 'cylinder' ? String(position.cylinder) : part.per;
};

export const askAt = (plan: readonly Ask[], part: Part, position: BorePosition): Ask | undefined =>
  part.reference === true ? undefined : findAsk(plan, part.quantity, keyOf(part, position));

const extentAt = (
  { form, fullAt }: Pick<SetUp, 'form' | 'fullAt'>,
  plan: readonly Ask[],
  part: Part,
  position: BorePosition,
): Extent => {
  if (form === 'third-axis') return 'third-axis';
  if (form === 'full' || fullAt.includes(`${part.key} ${keyOf(part, position)}`)) return 'full';
  return form === 'screening' ? 'one' : (askAt(plan, part, position)?.extent ?? 'one');
};

/** The cells of each part at each position, by the plan or by the form that was chosen instead of it. */
export const askedBy =
  (setUp: Pick<SetUp, 'form' | 'fullAt'>, plan: readonly Ask[]): Asked =>
  (part, position) =>
    cellsFor(part, extentAt(setUp, plan, part, position));

/**
 * Where Enter leads for a part: by the plan to the places that it asks, so that a sample is no more than
 * it says; everywhere for a part that the plan does not ask, and where a form was chosen instead.
 */
export const leadsBy =
  ({ form }: Pick<SetUp, 'form'>, plan: readonly Ask[]): Leads =>
  (part, position) =>
    form !== 'plan' ||
    part.reference === true ||
    !plan.some(({ quantity }) => quantity === part.quantity) ||
    askAt(plan, part, position) !== undefined;

/** The parts that Enter leads through: all of a chosen form; of the plan those that it asks for. */
export const partsAsked = (
  { form }: Pick<SetUp, 'form'>,
  plan: readonly Ask[],
  parts: readonly Part[],
): readonly Part[] =>
  form === 'plan'
    ? parts.filter(
        (part) => part.reference === true || plan.some((ask) => ask.quantity === part.quantity),
      )
    : parts;
