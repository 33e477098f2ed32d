import { compareQuantities } from '../../quantity/quantity';
import type { PositionResult } from '../clause-result';
import type { LimitRequirement } from '../limit';
import { getQuantityEntry } from '../quantity-catalogue';
import { decisionOf, getWritten } from './decision-of';
import type { Facts } from './facts';

const GOVERNS = 'The engine and cam maker’s own specification governs.';

const LOOSE_FLAT = `A loose flat tappet can rock and stop turning, wipe the oil off the lobe and ruin lifter and cam. Do not run the engine before it is put right. ${GOVERNS}`;
const LOOSE = `A loose lifter can rock in its bore and wear lobe and bore. ${GOVERNS}`;
const TIGHT = `A tight lifter can stick once the engine is hot. ${GOVERNS}`;

const sides = (limit: LimitRequirement, results: readonly PositionResult[]) => {
  const { dimension } = getQuantityEntry(limit.quantity);
  const { min, max } = decisionOf(limit).limits;
  const values = results
    .filter((result) => result.state === 'outside')
    .flatMap((result) => (result.exact === undefined ? [] : [getWritten(result.exact, dimension)]));
  return {
    above: max !== undefined && values.some((value) => compareQuantities(value, max) > 0),
    below: min !== undefined && values.some((value) => compareQuantities(value, min) < 0),
  };
};

/** What may hurt an engine or a person, said where it shows; it holds for mandatory limits too. */
export const cautionsFor = (
  limit: LimitRequirement,
  results: readonly PositionResult[],
  facts: Facts,
): readonly string[] => {
  if (limit.quantity !== 'tappet-clearance') return [];
  const { above, below } = sides(limit, results);
  const types = facts.answers.filter((fact) => fact.subject === 'tappet-type');
  const rollers = types.length > 0 && types.every((fact) => fact.answer.includes('roller'));
  return [...(above ? [rollers ? LOOSE : LOOSE_FLAT] : []), ...(below ? [TIGHT] : [])];
};
