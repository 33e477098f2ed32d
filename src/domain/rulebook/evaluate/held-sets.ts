import { agrees } from '../../decision/agree';
import { compare, min, type Rational, sub } from '../../quantity/rational';
import type { PositionResult, State } from '../clause-result';
import { writtenWords } from '../describe';
import type { NumberFact, SetNumber } from './facts';
import { type Held, heldNumber, weaknessOf } from './held-number';

const ONE_SET =
  'one set alone shows a breach and this clause wants a second, independent one to show it too';
const RULE = 'Two sets are not pooled: each is held against the limit by itself.';

export interface HeldEach extends Omit<Held, 'compared'> {
  /** A value as the rule rounds it, where it does. */
  readonly compare: (value: NumberFact['value']) => Held['compared'];
}

const withRule = (result: PositionResult): PositionResult => ({
  ...result,
  rule: result.rule === undefined ? RULE : `${result.rule} ${RULE}`,
});

const heldAs = (held: HeldEach, fact: NumberFact): PositionResult =>
  heldNumber({ ...held, fact, compared: held.compare(fact.value) });

const alone = (held: HeldEach): PositionResult => {
  const { fact } = held;
  const result = heldAs(held, fact);
  const wants = { wants: 'second-set' } as const;
  if (result.state === 'too-close' && result.pass !== false) return { ...result, ...wants };
  if (result.state !== 'outside' && result.pass !== false) return result;
  const weakness = weaknessOf(held) ?? ONE_SET;
  const open = { ...fact, cannotSupportBreach: weakness, liftedBy: undefined };
  return { ...heldAs(held, open), ...wants };
};

/** How far inside the window a value lies; below zero: outside of it. */
const marginOf = ({ decision }: HeldEach, value: Rational): Rational | undefined => {
  const { limits } = decision;
  const over = limits.min && sub(value, limits.min.value);
  const under = limits.max && sub(limits.max.value, value);
  return over && under ? min(over, under) : (over ?? under);
};

/** The set that speaks most for the competitor: farthest inside, or least beyond. */
const mildest = (held: HeldEach, facts: readonly NumberFact[]): number => {
  let best = 0;
  for (const [at, fact] of facts.entries()) {
    const here = marginOf(held, held.compare(fact.value).value);
    const before = facts[best];
    const there = before && marginOf(held, held.compare(before.value).value);
    if (here && there && compare(here, there) > 0) best = at;
  }
  return best;
};

const only = <T>(values: readonly T[]): T | undefined =>
  values.every((value) => value === values[0]) ? values[0] : undefined;

const setWords = (
  { set }: SetNumber,
  { value, uncertainty }: Pick<PositionResult, 'value' | 'uncertainty'>,
): string =>
  `set ${set} ${value === undefined ? '–' : writtenWords(value)}${uncertainty === undefined ? '' : ` ± ${writtenWords(uncertainty)}`}`;

const WORDS: Partial<Record<State, string>> = { within: 'within', outside: 'outside' };

/**
 * Two or more independent sets of one number, each held against the window by itself. A breach is
 * stated only when every set shows it, and a pass only when every set gives one; sets that differ by
 * more than their joint U give no statement. A person's choice of one set does not lift that. The value
 * shown is that of the set which speaks most for the competitor.
 */
export const heldSets = (held: HeldEach): PositionResult => {
  const { fact, position, limit } = held;
  const sets = fact.sets ?? [];
  if (sets.length < 2) return withRule(alone(held));
  const facts = sets.map(({ set: _set, ...number }): NumberFact => ({ ...fact, ...number }));
  const each = facts.map((one) => heldAs(held, one));
  const shown = each[mildest(held, facts)] ?? heldAs(held, fact);
  const figure = held.figure === undefined ? '' : `${held.figure}, `;
  const values = sets.map((set, at) => setWords(set, each[at] ?? shown)).join(', ');
  const lead = `${position.label}: ${figure}${values}; ${limit}`;
  const told = sets.map(({ set }, at) => ({
    set: String(set),
    state: each[at]?.state ?? shown.state,
    value: each[at]?.value,
    exact: each[at]?.exact,
    uncertainty: each[at]?.uncertainty,
  }));
  const base = withRule({ ...shown, sets: told });
  const silent = each.find(({ state }) => state === 'no-statement');
  if (silent !== undefined) return withRule({ ...silent, sets: told });
  const differ = facts.some((a, at) => facts.slice(at + 1).some((b) => !agrees(a, b)));
  if (differ)
    return {
      ...base,
      state: 'no-statement',
      pass: null,
      wants: 'new-set',
      sentence: `${lead}: no statement, since the sets differ by more than their joint uncertainty; measure again.`,
    };
  const state = only(each.map((one) => one.state)) ?? 'too-close';
  const pass = only(each.map((one) => one.pass)) ?? null;
  const said = WORDS[state] ?? 'too close to call';
  return { ...base, state, pass, sentence: `${lead}, each set by itself: ${said}.` };
};
