import { type Failure, failure } from '@/domain/failure';
import { beforeDeciding } from '@/domain/verdict/before-deciding';
import { type DecisionCase, decidingBy } from './find-case';

const NAME = {
  signed: 'not-in-this-state',
  'not-yours': 'conflict-of-interest',
  'no-interest': 'conflict-of-interest',
  open: 'not-in-this-state',
} as const;

/** Why this person cannot decide this case now; nothing when they can. */
export const refusal = (found: DecisionCase, actorId: string): Failure | undefined => {
  const unmet = beforeDeciding(decidingBy(found, actorId)).find(({ met }) => !met);
  return unmet && failure(NAME[unmet.key], unmet.words);
};
