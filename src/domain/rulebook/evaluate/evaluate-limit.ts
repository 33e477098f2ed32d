import type { PositionResult } from '../clause-result';
import { limitWords } from '../describe';
import type { LimitRequirement } from '../limit';
import { comparedValue, decisionOf } from './decision-of';
import { type Facts, findNumber, type Position, positionsFor, wasOutOfReach } from './facts';
import { heldNumber, missingAt } from './held-number';
import { heldSets } from './held-sets';

const sampled = (
  limit: LimitRequirement,
  facts: Facts,
  positions: readonly Position[],
): readonly Position[] => {
  if (limit.sample.kind === 'all') return positions;
  const taken = positions.filter(
    ({ key }) => findNumber(facts, limit.quantity, key, limit.figure) !== undefined,
  );
  const open = positions.filter((position) => !taken.includes(position));
  return [...taken, ...open.slice(0, Math.max(0, limit.sample.count - taken.length))];
};

/** Every position of the limit, or of its sample, held against it. */
export const evaluateLimit = (
  limit: LimitRequirement,
  facts: Facts,
  advisory: boolean,
): readonly PositionResult[] => {
  const decision = decisionOf(limit);
  const words = limitWords(limit);
  const positions = sampled(limit, facts, positionsFor(limit.per, facts.positions));
  return positions.map((position) => {
    const fact = findNumber(facts, limit.quantity, position.key, limit.figure);
    if (fact === undefined)
      return missingAt(position, wasOutOfReach(facts, limit.quantity, position.key));
    const held = {
      position,
      fact,
      decision,
      ringCheck: limit.ringCheck,
      unit: limit.unit,
      figure: limit.figure,
      advisory,
      limit: words,
    };
    // A declaration is one statement, and no set of readings.
    return limit.twoSets === 'each' && facts.origin === 'found'
      ? heldSets({ ...held, compare: (value) => comparedValue(limit, value) })
      : heldNumber({ ...held, compared: comparedValue(limit, fact.value) });
  });
};
