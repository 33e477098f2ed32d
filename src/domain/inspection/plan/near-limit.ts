import { parseWritten } from '../../quantity/parse';
import { abs, compare, mul, rational, sub } from '../../quantity/rational';
import type { Clause } from '../../rulebook/clause';
import type { PositionResult } from '../../rulebook/clause-result';
import { decisionOf } from '../../rulebook/evaluate/decision-of';
import { getQuantityEntry } from '../../rulebook/quantity-catalogue';

/** Expanded uncertainties between a value and its limit below which one reading is not enough. Common practice. */
const WIDTHS = rational(2n);

/**
 * Whether a screened value needs its full sheet: it is not clearly within, or lies less than twice its U
 * from a limit.
 */
export const isNearLimit = ({ requirement }: Clause, result: PositionResult): boolean => {
  if (['too-close', 'outside', 'does-not-comply'].includes(result.state)) return true;
  if (result.state !== 'within' || requirement?.kind !== 'limit') return false;
  const { dimension } = getQuantityEntry(requirement.quantity);
  const value = result.exact && parseWritten(result.exact, dimension);
  const uncertainty = result.uncertainty && parseWritten(result.uncertainty, dimension);
  if (value?.ok !== true || uncertainty?.ok !== true) return false;
  const room = mul(uncertainty.value.value, WIDTHS);
  const { min, max } = decisionOf(requirement).limits;
  return [min, max].some(
    (limit) => limit !== undefined && compare(abs(sub(value.value.value, limit.value)), room) < 0,
  );
};
