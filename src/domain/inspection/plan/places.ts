import type { QuantityName } from '../../rulebook/quantity-catalogue';

export interface CellPlace {
  readonly depth: string;
  readonly axis: string;
}

/** How much is read at one place: a single reading, two depths by two axes, or with a third axis. */
export type Extent = 'one' | 'full' | 'third-axis';

export interface Named {
  readonly key: string;
  readonly label: string;
}

const AXES: readonly Named[] = [
  { key: 'along', label: 'Along' },
  { key: 'across', label: 'Across' },
  { key: 'third', label: 'Third axis' },
];
const VALUE: readonly Named[] = [{ key: '', label: 'Value' }];
const READING: readonly Named[] = [{ key: '', label: 'Reading' }];

/** Depths by name of the land or the gallery, off the oil groove and holes. Common practice. */
const DEPTHS: Partial<Record<QuantityName, readonly Named[]>> = {
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

export const depthsOf = (quantity: QuantityName): readonly Named[] => DEPTHS[quantity] ?? READING;

/** A third axis shows odd lobing, which a gauge of two points cannot see on two. Bores of lifters only. */
export const axesOf = (quantity: QuantityName): readonly Named[] => {
  if (quantity === 'tappet-bore-diameter') return AXES;
  return quantity in DEPTHS ? AXES.slice(0, 2) : VALUE;
};

/** The cells that an extent asks, in the order in which they are read. */
export const placesFor = (quantity: QuantityName, extent: Extent): readonly CellPlace[] => {
  const all = depthsOf(quantity).flatMap(({ key: depth }) =>
    axesOf(quantity)
      .filter(({ key }) => extent === 'third-axis' || key !== 'third')
      .map(({ key: axis }) => ({ depth, axis })),
  );
  return extent === 'one' ? all.slice(0, 1) : all;
};
