import type { QuantityEntry } from './entry';

/** Lift and duration: the cam card. */
export const CAM_QUANTITIES = {
  'lobe-lift': {
    label: 'Lobe lift',
    dimension: 'length',
    unit: 'in',
    per: 'bore',
    source: 'cam-sheet',
    from: 'travel of the lifter or pushrod over one turn of the cam',
    needsDatum: true,
    needsLash: true,
  },
  'valve-lift': {
    label: 'Valve lift',
    dimension: 'length',
    unit: 'in',
    per: 'bore',
    source: 'cam-sheet',
    from: 'travel at the valve, or lobe lift × rocker ratio − lash where the rule says so',
    needsDatum: true,
    needsLash: true,
  },
  duration: {
    label: 'Duration',
    dimension: 'angle',
    unit: 'deg',
    per: 'bore',
    source: 'cam-sheet',
    from: 'crankshaft angle between the stated lifts, opening and closing',
    needsDatum: true,
    needsLash: true,
  },
} as const satisfies Readonly<Record<string, QuantityEntry>>;
