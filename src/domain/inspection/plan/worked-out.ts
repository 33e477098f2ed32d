import { type QuantityName, readingsFor } from '../../rulebook/quantity-catalogue';

const ASKED: Partial<Record<QuantityName, readonly QuantityName[]>> = {
  displacement: ['cylinder-bore', 'stroke'],
  'compression-ratio': [
    'cylinder-bore',
    'stroke',
    'chamber-volume',
    'piston-volume',
    'deck-clearance',
    'gasket-bore',
    'gasket-thickness',
  ],
};

/** Another way to a quantity that is usually read as it stands. */
const INSTEAD: Partial<Record<QuantityName, readonly QuantityName[]>> = {
  'valve-lift': ['lobe-lift', 'rocker-ratio'],
};

/** What an inspector reads so that a quantity can be worked out. */
export const askedFor = (name: QuantityName): readonly QuantityName[] =>
  ASKED[name] ?? readingsFor(name);

/** What may be read instead; nothing where there is one way only. */
export const insteadOf = (name: QuantityName): readonly QuantityName[] => INSTEAD[name] ?? [];

/** Every reading that a found quantity can stand on: itself, what it is worked out from, and the other way. */
export const standsOn = (name: QuantityName): readonly QuantityName[] => [
  ...new Set([name, ...readingsFor(name), ...askedFor(name), ...insteadOf(name)]),
];
