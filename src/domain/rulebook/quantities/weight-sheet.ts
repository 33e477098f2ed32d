import type { QuantityEntry } from './entry';

/** What goes on a scale. */
export const WEIGHT_QUANTITIES = {
  'lifter-weight': {
    label: 'Lifter weight',
    dimension: 'mass',
    unit: 'g',
    per: 'lifter',
    source: 'weight-sheet',
    from: 'one lifter, clean and dry, on the scale',
  },
  'piston-assembly-weight': {
    label: 'Piston assembly weight',
    dimension: 'mass',
    unit: 'g',
    per: 'cylinder',
    source: 'weight-sheet',
    from: 'piston, pin, rings and locks together on the scale',
  },
  'connecting-rod-weight': {
    label: 'Connecting rod weight',
    dimension: 'mass',
    unit: 'g',
    per: 'cylinder',
    source: 'weight-sheet',
    from: 'rod with bolts and cap, without bearings',
  },
  'crankshaft-weight': {
    label: 'Crankshaft weight',
    dimension: 'mass',
    unit: 'lb',
    per: 'engine',
    source: 'weight-sheet',
    from: 'bare crankshaft on the scale',
  },
  'car-weight': {
    label: 'Car weight',
    dimension: 'mass',
    unit: 'lb',
    per: 'car',
    source: 'weight-sheet',
    from: 'the car over the scale, as the datum says: with or without driver and fuel',
    needsDatum: true,
  },
} as const satisfies Readonly<Record<string, QuantityEntry>>;
