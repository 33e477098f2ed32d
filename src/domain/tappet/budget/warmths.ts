import { getMaterial, type Material } from '../../measurement/material';
import type { Warmth } from '../../measurement/temperature';
import type { BoreSheet } from '../bore-sheet';

export interface Warmths {
  readonly bore: Warmth;
  readonly lifter: Warmth;
  readonly setting?: Warmth | undefined;
  readonly gauge?: Warmth | undefined;
}

/** Iron for a block and steel for a lifter, a ring and a gauge, unless stated. */
export const boreMaterial = (sheet: BoreSheet): Material =>
  sheet.materials?.bore ?? getMaterial('iron');

/** Temperatures with their materials; `null` when none were logged. */
export const warmthsOf = (sheet: BoreSheet): Warmths | null => {
  const { temperatures, materials } = sheet;
  if (temperatures === undefined) return null;
  const steel = getMaterial('steel');
  const { bore, lifter, setting, gauge } = temperatures;
  return {
    bore: { temperature: bore, material: boreMaterial(sheet) },
    lifter: { temperature: lifter, material: materials?.lifter ?? steel },
    setting: setting && { temperature: setting, material: steel },
    gauge: gauge && { temperature: gauge, material: steel },
  };
};
