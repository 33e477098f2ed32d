import { convert } from '@/domain/quantity/convert';
import { asciiIn } from '@/domain/quantity/format';
import { parseWritten } from '@/domain/quantity/parse';
import type { QuantityName } from '@/domain/rulebook/quantity-catalogue';
import type { RulesInForce } from '@/domain/rulebook/rules-in-force';
import type { Scale } from '../set-up';

const SIZED: readonly QuantityName[] = ['lifter-body-diameter', 'foot-diameter'];

/**
 * The size that two typed digits are completed from: the nominal size of lifters by their clause, as the
 * gauge resolves it. `23` of 0.8420 is 0.8423. Nothing where the rules name no size.
 */
export const baseFor = (
  rules: Pick<RulesInForce, 'clauses'>,
  quantity: QuantityName,
  scale: Scale,
): string | undefined => {
  if (!SIZED.includes(quantity) || scale.decimals < 3) return undefined;
  for (const { requirement } of rules.clauses) {
    if (requirement?.kind !== 'limit' || requirement.quantity !== 'lifter-body-diameter') continue;
    const size = requirement.nominal?.size ?? requirement.max ?? requirement.min;
    const read = size && parseWritten(size, 'length');
    if (read?.ok === true)
      return asciiIn(convert(read.value, scale.unit), scale.unit, scale.decimals);
  }
  return undefined;
};

/** Digits of a known size that need not be typed: "0.84" of 0.8420. */
export const impliedOf = (base: string): string => base.slice(0, -2);
