import type { Clause } from '@/domain/rulebook/clause';
import {
  getQuantityEntry,
  type QuantityName,
  readingsFor,
} from '@/domain/rulebook/quantity-catalogue';
import type { RulesInForce } from '@/domain/rulebook/rules-in-force';

/** How much is read at each place: one reading to screen, or a full sheet. */
export type Form = 'screening' | 'full' | 'third-axis';

export const FORM_WORDS: Readonly<Record<Form, string>> = {
  screening: 'Screening: one reading a place',
  full: 'Full: two depths, two axes',
  'third-axis': 'Full, with a third axis',
};

export interface CellPlace {
  readonly depth: string;
  readonly axis: string;
}

/** One kind of number read per bore, cylinder or engine. */
export interface Part {
  readonly quantity: QuantityName;
  readonly label: string;
  readonly per: 'bore' | 'cylinder' | 'engine' | 'car';
  readonly depths: readonly { readonly key: string; readonly label: string }[];
  readonly axes: readonly { readonly key: string; readonly label: string }[];
  /** The clause that it is read for; an advisory one where no mandatory one asks. */
  readonly clause?: Clause | undefined;
}

const AXES = [
  { key: 'along', label: 'Along' },
  { key: 'across', label: 'Across' },
  { key: 'third', label: 'Third axis' },
] as const;

const DEPTHS: Partial<Record<QuantityName, readonly { key: string; label: string }[]>> = {
  'lifter-body-diameter': [
    { key: 'upper', label: 'Body, upper' },
    { key: 'lower', label: 'Body, lower' },
  ],
  'foot-diameter': [{ key: 'foot', label: 'Foot' }],
  'tappet-bore-diameter': [
    { key: 'above', label: 'Above the gallery' },
    { key: 'below', label: 'Below the gallery' },
  ],
  'cylinder-bore': [
    { key: 'top', label: 'Top of the bore' },
    { key: 'bottom', label: 'Bottom of the bore' },
  ],
};

const SHORT: Partial<Record<QuantityName, string>> = {
  'lifter-body-diameter': 'Lifter',
  'foot-diameter': 'Foot',
  'tappet-bore-diameter': 'Bore',
};

/** What is read so that a quantity can be worked out, displacement from its bores and stroke included. */
const readFor = (name: QuantityName): readonly QuantityName[] =>
  name === 'displacement' ? ['cylinder-bore', 'stroke'] : readingsFor(name);

const perOf = (quantity: QuantityName): Part['per'] => {
  const { per } = getQuantityEntry(quantity);
  return per === 'lifter' ? 'bore' : per;
};

const clausesFor = (rules: Pick<RulesInForce, 'clauses'>, quantity: QuantityName) =>
  rules.clauses.filter(
    ({ requirement }) =>
      requirement?.kind === 'limit' && readFor(requirement.quantity).includes(quantity),
  );

/** The clause shown while a quantity is read: its own first, then a mandatory one, then advice. */
const clauseFor = (rules: Pick<RulesInForce, 'clauses'>, quantity: QuantityName) => {
  const asking = clausesFor(rules, quantity);
  return (
    asking.find(
      ({ requirement }) => requirement?.kind === 'limit' && requirement.quantity === quantity,
    ) ??
    asking.find(({ force }) => force === 'mandatory') ??
    asking[0]
  );
};

/** The parts of the sheet that these rules ask for, in the rulebook's order; lifter before bore. */
export const partsOf = (rules: Pick<RulesInForce, 'clauses'>, form: Form): readonly Part[] => {
  const asked = rules.clauses.flatMap(({ requirement }) =>
    requirement?.kind === 'limit' ? readFor(requirement.quantity) : [],
  );
  const order: readonly QuantityName[] = [
    'lifter-body-diameter',
    'foot-diameter',
    'tappet-bore-diameter',
  ];
  const quantities = [...order.filter((name) => asked.includes(name)), ...asked];
  return [...new Set(quantities)].map((quantity): Part => {
    const depths = DEPTHS[quantity] ?? [{ key: '', label: 'Reading' }];
    const round = quantity.endsWith('diameter') || quantity === 'cylinder-bore';
    const axes = round
      ? AXES.slice(0, form === 'third-axis' && quantity === 'tappet-bore-diameter' ? 3 : 2)
      : [{ key: '', label: 'Value' }];
    const one = form === 'screening';
    return {
      quantity,
      label: SHORT[quantity] ?? getQuantityEntry(quantity).label,
      per: perOf(quantity),
      depths: one ? depths.slice(0, 1) : depths,
      axes: one ? axes.slice(0, 1) : axes,
      clause: clauseFor(rules, quantity),
    };
  });
};

/** The checks without numbers, each asked once for the engine or once a bore. */
export const checksOf = (rules: Pick<RulesInForce, 'clauses'>): readonly Clause[] =>
  rules.clauses.filter(
    ({ requirement, force }) =>
      force !== 'text' &&
      (requirement?.kind === 'choice' ||
        requirement?.kind === 'yes-no' ||
        requirement?.kind === 'plug-gauge' ||
        requirement?.kind === 'matches-paperwork'),
  );

export const cellsOf = (part: Part): readonly CellPlace[] =>
  part.depths.flatMap(({ key: depth }) => part.axes.map(({ key: axis }) => ({ depth, axis })));

export const cellKey = ({ depth, axis }: CellPlace): string => `${depth}/${axis}`;

/** "Below the gallery, across". */
export const cellWords = (part: Part, { depth, axis }: CellPlace): string => {
  const d = part.depths.find((one) => one.key === depth)?.label ?? part.label;
  const a = part.axes.find((one) => one.key === axis)?.label.toLowerCase();
  return axis === '' || a === undefined ? d : `${d}, ${a}`;
};
