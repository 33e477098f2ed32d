import { parseQuantity } from '@/domain/quantity/parse';
import type { Quantity } from '@/domain/quantity/quantity';
import type { Clause } from '@/domain/rulebook/clause';
import type { Facts, NumberFact } from '@/domain/rulebook/evaluate/facts';
import type { LimitRequirement } from '@/domain/rulebook/limit';
import type { RuleDimension } from '@/domain/rulebook/quantities/entry';
import type { QuantityName } from '@/domain/rulebook/quantity-catalogue';
import { getQuantityEntry } from '@/domain/rulebook/quantity-catalogue';
import type { Requirement } from '@/domain/rulebook/requirement';
import { inches, limit } from '@/domain/rulebook/rule-sets/rule-set';

export const quantity = (name: QuantityName, written: string): Quantity<RuleDimension> => {
  const { dimension, unit } = getQuantityEntry(name);
  const parsed = parseQuantity(written, { dimension, defaultUnit: unit });
  if (!parsed.ok) throw new Error(parsed.failure.detail);
  return parsed.value;
};

/** One tenth of a thousandth of an inch, in metres. */
export const TENTH = 0.00000254;

export const number = (
  name: QuantityName,
  position: string,
  written: string,
  more: Partial<NumberFact> = {},
): NumberFact => ({
  quantity: name,
  position,
  value: quantity(name, written),
  standardUncertainty: 0,
  ...more,
});

export const bores = (...keys: readonly string[]) =>
  keys.map((key) => ({ key, label: `Bore ${key}` }));

export const facts = (more: Partial<Facts> = {}): Facts => ({
  origin: 'found',
  positions: { bores: bores('1I', '1E'), cylinders: [{ key: '1', label: 'Cylinder 1' }] },
  numbers: [],
  answers: [],
  evidence: [],
  couldNotBeReached: [],
  references: [],
  ...more,
});

export const clause = (
  requirement: Requirement | undefined,
  more: Partial<Clause> = {},
): Clause => ({
  number: '4.6',
  heading: 'A clause',
  words: 'What the clause says.',
  force: 'mandatory',
  requirement,
  ...more,
});

/** A sound clearance limit to bend in one place at a time. */
export const clearance = (more: Partial<LimitRequirement> = {}): LimitRequirement =>
  limit({
    quantity: 'tappet-clearance',
    unit: 'in',
    per: 'bore',
    figure: 'mean',
    min: inches('0.0013'),
    max: inches('0.0019'),
    ...more,
  });

export const lift = (more: Partial<LimitRequirement> = {}): LimitRequirement =>
  limit({
    quantity: 'valve-lift',
    unit: 'in',
    per: 'bore',
    datum: 'at the retainer',
    lash: inches('0.000'),
    checkingLifter: 'solid',
    max: inches('0.480'),
    ...more,
  });
