import { parseWritten } from '../../quantity/parse';
import { abs, compare, sub } from '../../quantity/rational';
import type { Clause } from '../../rulebook/clause';
import type { PositionResult } from '../../rulebook/clause-result';
import { decisionOf } from '../../rulebook/evaluate/decision-of';
import { getQuantityEntry } from '../../rulebook/quantity-catalogue';

/**
 * Whether a screened value needs its full sheet: it is not within, or its U reaches a limit. Common
 * practice: what is clear in one reading is not made clearer by more.
 */
export const isNearLimit = ({ requirement }: Clause, result: PositionResult): boolean => {
  if (['too-close', 'outside', 'does-not-comply'].includes(result.state)) return true;
  if (result.wants !== undefined) return true;
  if (result.state !== 'within' || requirement?.kind !== 'limit') return false;
  const { dimension } = getQuantityEntry(requirement.quantity);
  const value = result.exact && parseWritten(result.exact, dimension);
  const uncertainty = result.uncertainty && parseWritten(result.uncertainty, dimension);
  if (value?.ok !== true || uncertainty?.ok !== true) return false;
  const room = uncertainty.value.value;
  const { min, max } = decisionOf(requirement).limits;
  return [min, max].some(
    (limit) => limit !== undefined && compare(abs(sub(value.value.value, limit.value)), room) <= 0,
  );
};
