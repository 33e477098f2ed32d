import type { Valve } from '../../tappet/layout/bore-layout';
import { findDegree } from '../cam/cam-place';
import { findBore, findCylinder, findValve, rowsFor } from './positions';
import type { WantedSheet } from './sheet-cell';

/** Which columns say where a row belongs, from 0. */
export interface SheetPlaces {
  readonly position: number | undefined;
  readonly cylinder: number | undefined;
  readonly valve: number | undefined;
}

const at = (row: readonly string[], column: number | undefined): string =>
  column === undefined ? '' : (row[column] ?? '').trim();

/** The place that a row means, with a column's own valve; none where it does not say, or says one that is not there. */
export const placeAt = (
  row: readonly string[],
  places: SheetPlaces,
  ownValve: Valve | undefined,
  { form, layout }: WantedSheet,
): string | undefined => {
  if (form.per === 'degree') return findDegree(at(row, places.position));
  const byBore = form.per === 'bore' || form.per === 'lifter';
  const cylinder = findCylinder(at(row, places.cylinder));
  if (!byBore) return rowsFor(form.per, layout).find((place) => place.key === cylinder)?.key;
  if (places.position !== undefined) return findBore(at(row, places.position), layout);
  const valve = ownValve ?? findValve(at(row, places.valve));
  return cylinder === undefined || valve === undefined
    ? undefined
    : findBore(`${cylinder} ${valve}`, layout);
};

/** What a row writes for its place. */
export const nameIn = (row: readonly string[], places: SheetPlaces): string =>
  [places.position, places.cylinder, places.valve]
    .map((column) => at(row, column))
    .filter((part) => part !== '')
    .join(' ');
