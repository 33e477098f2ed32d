import {
  axesOf,
  type CellPlace,
  depthsOf,
  type Extent,
  type Named,
  placesFor,
} from '@/domain/inspection/plan/places';
import { askedFor, insteadOf } from '@/domain/inspection/plan/worked-out';
import type { Clause } from '@/domain/rulebook/clause';
import { getQuantityEntry, type QuantityName } from '@/domain/rulebook/quantity-catalogue';
import type { RulesInForce } from '@/domain/rulebook/rules-in-force';

/** How much is read at each place: as the plan asks, or the same everywhere. */
export type Form = 'plan' | 'screening' | 'full' | 'third-axis';

export const FORM_WORDS: Readonly<Record<Form, string>> = {
  plan: 'As the rules ask: screening first',
  screening: 'Screening: one reading a place',
  full: 'Full: two depths, two axes',
  'third-axis': 'Full, with a third axis',
};

/** One kind of number read per bore, cylinder or engine, or of parts of a reference set. */
export interface Part {
  /** A quantity's name; that of a reference set has a mark before it. */
  readonly key: string;
  readonly quantity: QuantityName;
  readonly label: string;
  readonly per: 'bore' | 'cylinder' | 'engine' | 'car';
  readonly depths: readonly Named[];
  readonly axes: readonly Named[];
  /** The clause that it is read for; an advisory one where no mandatory one asks. */
  readonly clause?: Clause | undefined;
  /** Parts of a reference set, one a row. */
  readonly reference?: boolean | undefined;
}

const SHORT: Partial<Record<QuantityName, string>> = {
  'lifter-body-diameter': 'Lifter',
  'foot-diameter': 'Foot',
  'tappet-bore-diameter': 'Bore',
};

const labelOf = (quantity: QuantityName): string =>
  SHORT[quantity] ?? getQuantityEntry(quantity).label;

/** What may be read for a quantity, the other way to it included. */
const readFor = (name: QuantityName): readonly QuantityName[] => [
  ...askedFor(name),
  ...insteadOf(name),
];

const perOf = (quantity: QuantityName): Part['per'] => {
  const { per } = getQuantityEntry(quantity);
  return per === 'lifter' ? 'bore' : per;
};

const clausesFor = (rules: Pick<RulesInForce, 'clauses'>, quantity: QuantityName) =>
  rules.clauses.filter(({ requirement }) =>
    requirement?.kind === 'limit'
      ? readFor(requirement.quantity).includes(quantity)
      : requirement?.kind === 'reference-average' && requirement.quantity === quantity,
  );

/** The clause shown while a quantity is read: its own first, then a mandatory one, then advice. */
const clauseFor = (rules: Pick<RulesInForce, 'clauses'>, quantity: QuantityName) => {
  const asking = clausesFor(rules, quantity);
  return (
    asking.find(
      ({ requirement }) =>
        requirement !== undefined && 'quantity' in requirement && requirement.quantity === quantity,
    ) ??
    asking.find(({ force }) => force === 'mandatory') ??
    asking[0]
  );
};

/** A clause about the mean of reference parts has them read first: at least as many as it counts. */
const referencePartsOf = (clause: Clause): readonly Part[] => {
  const rule = clause.requirement;
  if (rule?.kind !== 'reference-average') return [];
  const rows = Array.from({ length: Math.max(rule.n, 1) + 2 }, (_, i) => ({
    key: `R${i + 1}`,
    label: `Reference part R${i + 1}${i < rule.n ? '' : ', if there is one'}`,
  }));
  return [
    {
      key: `reference ${rule.quantity}`,
      quantity: rule.quantity,
      label: `Reference: ${labelOf(rule.quantity).toLowerCase()}`,
      per: 'engine',
      depths: rows,
      axes: [{ key: '', label: 'Value' }],
      clause,
      reference: true,
    },
  ];
};

/** The parts of the sheet that these rules ask for, in the rulebook's order; lifter before bore. */
export const partsOf = (rules: Pick<RulesInForce, 'clauses'>, form: Form): readonly Part[] => {
  const asked = rules.clauses.flatMap(({ requirement }) => {
    if (requirement?.kind === 'limit') return readFor(requirement.quantity);
    return requirement?.kind === 'reference-average' ? [requirement.quantity] : [];
  });
  const order: readonly QuantityName[] = [
    'lifter-body-diameter',
    'foot-diameter',
    'tappet-bore-diameter',
  ];
  const quantities = [...order.filter((name) => asked.includes(name)), ...asked];
  return [
    ...[...new Set(quantities)].map(
      (quantity): Part => ({
        key: quantity,
        quantity,
        label: labelOf(quantity),
        per: perOf(quantity),
        depths: depthsOf(quantity),
        axes: axesOf(quantity).filter(({ key }) => form === 'third-axis' || key !== 'third'),
        clause: clauseFor(rules, quantity),
      }),
    ),
    ...rules.clauses.flatMap(referencePartsOf),
  ];
};

/** The cells of an extent; of a reference set those that its clause counts. */
export const cellsFor = (part: Part, extent: Extent): readonly CellPlace[] => {
  if (part.reference !== true) return placesFor(part.quantity, extent);
  const rule = part.clause?.requirement;
  const count = rule?.kind === 'reference-average' ? rule.n : part.depths.length;
  return part.depths.slice(0, count).map(({ key: depth }) => ({ depth, axis: '' }));
};

export const cellKey = ({ depth, axis }: CellPlace): string => `${depth}/${axis}`;

/** "Below the gallery, across". */
export const cellWords = (part: Part, { depth, axis }: CellPlace): string => {
  const d = part.depths.find((one) => one.key === depth)?.label ?? part.label;
  const a = part.axes.find((one) => one.key === axis)?.label.toLowerCase();
  return axis === '' || a === undefined ? d : `${d}, ${a}`;
};
