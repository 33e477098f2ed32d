import { parseQuantity } from '../../quantity/parse';
import { quantityOf } from '../../quantity/quantity';
import { compare } from '../../quantity/rational';
import { fromStored } from '../../quantity/stored';
import type { Position } from '../../rulebook/evaluate/facts';
import type { Valve } from '../../tappet/layout/bore-layout';

/**
 * On a cam table a row is a crankshaft angle and a column is a lobe: a reading’s position is the angle in
 * degrees (`112.5`), its axis the lobe (`intake`).
 */
export const LOBES: readonly Valve[] = ['intake', 'exhaust'];

/** The lobe of a cam table’s reading; nothing for a reading of any other sheet. */
export const lobeOf = ({ axis }: { readonly axis: string }): Valve | undefined =>
  LOBES.find((lobe) => lobe === axis);

/** An angle as it stands in a cell, `112,5` or `30°`, in degrees with a point; nothing for anything else. */
export const findDegree = (text: string): string | undefined => {
  if (!/\d/.test(text)) return undefined;
  const read = parseQuantity(text, { dimension: 'angle', defaultUnit: 'deg' });
  return read.ok ? quantityOf('angle', read.value.value, 'deg').text : undefined;
};

export const degreeAt = (position: string) => fromStored({ text: position, unit: 'deg' }, 'angle');

const rising = (a: string, b: string): number => compare(degreeAt(a).value, degreeAt(b).value);

/** Common practice for a table that is written by hand: every ten degrees over one turn of the cam. */
const BY_HAND = Array.from({ length: 73 }, (_, at) => String(at * 10));

const label = (key: string): Position => ({ key, label: `${key} deg` });

/** The rows of a table in rising order: those of a file, else every ten degrees and what was typed between. */
export const degreeRows = (
  written: readonly { readonly position: string; readonly source?: unknown }[],
): readonly Position[] => {
  const fromFile = written.some(({ source }) => source !== undefined);
  const keys = new Set([...(fromFile ? [] : BY_HAND), ...written.map(({ position }) => position)]);
  return [...keys].toSorted(rising).map(label);
};
