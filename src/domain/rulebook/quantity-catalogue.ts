import type { Dimension } from '../quantity/dimension';

/** What a check is made once for. `lifter` and `bore` run over the same positions. */
export type Per = 'bore' | 'lifter' | 'cylinder' | 'engine' | 'car';

/** Which sheet the numbers for a quantity come from. */
export type Source = 'lifter-sheet' | 'engine-sheet' | 'cam-sheet' | 'weight-sheet';

/** Temperatures are logged beside readings, never ruled on: differences and means need no offset. */
export type RuleDimension = Exclude<Dimension, 'temperature'>;

export interface QuantityEntry {
  readonly label: string;
  readonly dimension: RuleDimension;
  readonly unit: string;
  readonly per: Per;
  readonly source: Source;
  /** The readings or quantities it is worked out from, in words. */
  readonly from: string;
  /** A limit on it means nothing until it says where it is measured. */
  readonly needsDatum?: boolean;
  /** It must say the lash and whether a solid checking lifter stands in. */
  readonly needsLash?: boolean;
  /** Several readings at one position: a limit must say which figure counts. */
  readonly needsFigure?: boolean;
}

/** Every quantity that a requirement can name. Keys are permanent: stored rules hold them. */
export const QUANTITIES = {
  'lifter-body-diameter': {
    label: 'Lifter body diameter',
    dimension: 'length',
    unit: 'in',
    per: 'lifter',
    source: 'lifter-sheet',
    from: 'micrometer readings of the body at its widest, off the oil groove and holes',
    needsFigure: true,
  },
  'foot-diameter': {
    label: 'Lifter foot diameter',
    dimension: 'length',
    unit: 'in',
    per: 'lifter',
    source: 'lifter-sheet',
    from: 'micrometer readings of the foot',
    needsFigure: true,
  },
  'foot-less-body': {
    label: 'Foot diameter less body diameter',
    dimension: 'length',
    unit: 'in',
    per: 'lifter',
    source: 'lifter-sheet',
    from: 'mean foot diameter less mean body diameter of the same lifter',
  },
  'lifter-height': {
    label: 'Lifter height',
    dimension: 'length',
    unit: 'in',
    per: 'lifter',
    source: 'lifter-sheet',
    from: 'height gauge or micrometer reading from the foot to the top of the body',
  },
  'tappet-bore-diameter': {
    label: 'Tappet bore diameter',
    dimension: 'length',
    unit: 'in',
    per: 'bore',
    source: 'lifter-sheet',
    from: 'bore gauge readings, off the oil holes',
    needsFigure: true,
  },
  'tappet-clearance': {
    label: 'Lifter-bore clearance',
    dimension: 'length',
    unit: 'in',
    per: 'bore',
    source: 'lifter-sheet',
    from: 'bore diameter less lifter body diameter at the same bore',
    needsFigure: true,
  },
  'bore-out-of-round': {
    label: 'Tappet bore out-of-round',
    dimension: 'length',
    unit: 'in',
    per: 'bore',
    source: 'lifter-sheet',
    from: 'largest difference in diameter between axes at one depth',
  },
  'bore-taper': {
    label: 'Tappet bore taper',
    dimension: 'length',
    unit: 'in',
    per: 'bore',
    source: 'lifter-sheet',
    from: "range of the depths' means",
  },
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
  'rocker-ratio': {
    label: 'Rocker ratio',
    dimension: 'ratio',
    unit: '1',
    per: 'bore',
    source: 'engine-sheet',
    from: 'valve travel over pushrod travel at the same cam angle',
  },
  'spring-load': {
    label: 'Valve spring load',
    dimension: 'force',
    unit: 'lbf',
    per: 'bore',
    source: 'engine-sheet',
    from: 'load at the stated height',
    needsDatum: true,
  },
  'cylinder-bore': {
    label: 'Cylinder bore',
    dimension: 'length',
    unit: 'in',
    per: 'cylinder',
    source: 'engine-sheet',
    from: 'bore gauge readings of the cylinder',
    needsFigure: true,
  },
  stroke: {
    label: 'Stroke',
    dimension: 'length',
    unit: 'in',
    per: 'engine',
    source: 'engine-sheet',
    from: 'piston travel from top to bottom dead centre',
  },
  displacement: {
    label: 'Displacement',
    dimension: 'volume',
    unit: 'in³',
    per: 'engine',
    source: 'engine-sheet',
    from: 'π/4 × bore² × stroke, summed over the cylinders',
  },
  'chamber-volume': {
    label: 'Combustion chamber volume',
    dimension: 'volume',
    unit: 'cc',
    per: 'cylinder',
    source: 'engine-sheet',
    from: 'fluid poured through a plate',
  },
  'piston-volume': {
    label: 'Piston volume',
    dimension: 'volume',
    unit: 'cc',
    per: 'cylinder',
    source: 'engine-sheet',
    from: 'dish and valve pockets, by fluid; a dome counts minus',
  },
  'deck-clearance': {
    label: 'Deck clearance',
    dimension: 'length',
    unit: 'in',
    per: 'cylinder',
    source: 'engine-sheet',
    from: 'piston below the deck at top dead centre; above it counts minus',
  },
  'gasket-bore': {
    label: 'Gasket bore',
    dimension: 'length',
    unit: 'in',
    per: 'engine',
    source: 'engine-sheet',
    from: 'opening of the head gasket as compressed',
  },
  'gasket-thickness': {
    label: 'Gasket thickness',
    dimension: 'length',
    unit: 'in',
    per: 'engine',
    source: 'engine-sheet',
    from: 'head gasket as compressed',
  },
  'compression-ratio': {
    label: 'Compression ratio',
    dimension: 'ratio',
    unit: '1',
    per: 'cylinder',
    source: 'engine-sheet',
    from: '(swept volume + clearance volume) ÷ clearance volume',
  },
  'port-area': {
    label: 'Port area',
    dimension: 'area',
    unit: 'in²',
    per: 'cylinder',
    source: 'engine-sheet',
    from: 'the section at the stated place',
    needsDatum: true,
  },
  'restrictor-area': {
    label: 'Restrictor area',
    dimension: 'area',
    unit: 'in²',
    per: 'engine',
    source: 'engine-sheet',
    from: 'π/4 × smallest diameter², summed over the holes',
  },
  'valve-head-diameter': {
    label: 'Valve head diameter',
    dimension: 'length',
    unit: 'in',
    per: 'bore',
    source: 'engine-sheet',
    from: 'micrometer reading of the head',
  },
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

export type QuantityName = keyof typeof QUANTITIES;

export const isQuantityName = (name: string): name is QuantityName =>
  Object.hasOwn(QUANTITIES, name);

/** The catalogue's entry, with its optional marks readable. */
export const getQuantityEntry = (name: QuantityName): QuantityEntry => QUANTITIES[name];

export const QUANTITY_NAMES: readonly QuantityName[] =
  Object.keys(QUANTITIES).filter(isQuantityName);

const READ: Partial<Record<QuantityName, readonly QuantityName[]>> = {
  'foot-less-body': ['lifter-body-diameter', 'foot-diameter'],
  'tappet-clearance': ['lifter-body-diameter', 'tappet-bore-diameter'],
  'bore-out-of-round': ['tappet-bore-diameter'],
  'bore-taper': ['tappet-bore-diameter'],
  displacement: ['displacement', 'cylinder-bore', 'stroke'],
};

/** What is read off a gauge, or written on a sheet, so that the quantity can be worked out. */
export const readingsFor = (name: QuantityName): readonly QuantityName[] => READ[name] ?? [name];
