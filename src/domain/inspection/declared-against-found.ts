import type { Written } from '../quantity/dimension';
import { evaluateMatch } from '../rulebook/evaluate/evaluate-match';
import type { Facts } from '../rulebook/evaluate/facts';
import { findNumber } from '../rulebook/evaluate/facts';
import { getQuantityEntry, type QuantityName } from '../rulebook/quantity-catalogue';

/** One number as it was declared and as it was found. */
export interface DeclaredAgainstFound {
  readonly quantity: QuantityName;
  readonly label: string;
  readonly position: string;
  readonly declared: Written;
  readonly found: Written;
  /** Beyond the uncertainty of what was found. */
  readonly differs: boolean;
  readonly sentence: string;
}

const written = ({ text, unit }: Written): Written => ({ text, unit });

/**
 * Every number that was both declared and found, in the declaration's order. A difference is
 * information for the officials; it breaches nothing unless a clause says so.
 */
export const declaredAgainstFound = (facts: Facts): readonly DeclaredAgainstFound[] => {
  const { declared } = facts;
  if (declared === undefined) return [];
  const quantities = [...new Set(declared.numbers.map((fact) => fact.quantity))];
  return quantities.flatMap((quantity) => {
    const { label, per } = getQuantityEntry(quantity);
    const rule = { kind: 'matches-paperwork', subject: quantity, question: label, per } as const;
    return evaluateMatch(rule, facts, false).flatMap(
      ({ position, state, sentence }): readonly DeclaredAgainstFound[] => {
        const found = findNumber(facts, quantity, position, undefined);
        const on = found && findNumber(declared, quantity, position, found.figure);
        if (found === undefined || on === undefined) return [];
        return [
          {
            quantity,
            label,
            position,
            declared: written(on.value),
            found: written(found.value),
            differs: state === 'outside',
            sentence,
          },
        ];
      },
    );
  });
};
