import { CAM_QUANTITIES } from './quantities/cam-sheet';
import { ENGINE_QUANTITIES } from './quantities/engine-sheet';
import type { QuantityEntry } from './quantities/entry';
import { LIFTER_QUANTITIES } from './quantities/lifter-sheet';
import { WEIGHT_QUANTITIES } from './quantities/weight-sheet';

/** Every quantity that a requirement can name. Keys are permanent: stored rules hold them. */
export const QUANTITIES = {
  ...LIFTER_QUANTITIES,
  ...CAM_QUANTITIES,
  ...ENGINE_QUANTITIES,
  ...WEIGHT_QUANTITIES,
} as const;

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
