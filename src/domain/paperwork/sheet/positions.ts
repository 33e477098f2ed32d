import { positionsIn } from '../../inspection/found-facts';
import type { Position } from '../../rulebook/evaluate/facts';
import type { SheetForm } from '../../rulebook/form/form';
import type { Per } from '../../rulebook/quantities/entry';
import type { BoreLayout, Valve } from '../../tappet/layout/bore-layout';
import { degreeRows } from '../cam/cam-place';

const VALVES: Readonly<Record<string, Valve>> = {
  i: 'intake',
  in: 'intake',
  int: 'intake',
  intake: 'intake',
  inlet: 'intake',
  inl: 'intake',
  e: 'exhaust',
  ex: 'exhaust',
  exh: 'exhaust',
  exhaust: 'exhaust',
  einlass: 'intake',
  auslass: 'exhaust',
};

const FILLERS =
  /\b(cylinders?|cyl|zylinder|zyl|bores?|lifters?|tappets?|valves?|no|nr|number|pos|position)\b/g;

/** `intake`, `I`, `Exh.`: nothing for anything else. */
export const findValve = (text: string): Valve | undefined =>
  VALVES[text.trim().toLowerCase().replace(/\.$/, '')];

/** A cylinder's number as it stands in a cell: `3`, `Cyl. 3`, `#3`, or `3.0` as spreadsheets write it. */
export const findCylinder = (text: string): string | undefined =>
  /^(?:(?:cyl|zyl)\w*\.?\s*)?#?\s*([1-9]\d?)(?:[.,]0+)?$/i.exec(text.trim())?.[1];

const plain = (text: string): string =>
  text
    .toLowerCase()
    .replace(/[._\-/()]+(?!\d)/g, ' ')
    .replace(/[_\-/()]+/g, ' ')
    .replace(FILLERS, ' ')
    .trim();

/** The bore's name for `3I`, `I3`, `#3 Int.`, `Cyl 3 exhaust`, `Exhaust-3`, and `3 intake 2` where there are two. */
export const findBore = (text: string, layout: BoreLayout): string | undefined => {
  const parts = plain(text).match(/[a-z]+|\d+/g) ?? [];
  const [valve, ...otherWords] = parts.filter((part) => /[a-z]/.test(part));
  const numbers = parts.filter((part) => /\d/.test(part)).map(Number);
  const named = valve === undefined ? undefined : VALVES[valve];
  if (named === undefined || otherWords.length > 0 || numbers.length === 0) return undefined;
  const [cylinder, index] = numbers;
  const name = [cylinder, named, ...(index === undefined ? [] : [index])].join(' ');
  return positionsIn(layout).bores.find((bore) => bore.key === name)?.key;
};

/** The places that something is asked for. */
export const rowsFor = (per: Per, layout: BoreLayout): readonly Position[] => {
  const positions = positionsIn(layout);
  if (per === 'bore' || per === 'lifter') return positions.bores;
  if (per === 'cylinder') return positions.cylinders;
  return [{ key: per, label: per === 'car' ? 'Car' : 'Engine' }];
};

/** The rows that a sheet has: places of the engine, or the angles of a cam table as far as it is written. */
export const sheetRows = (
  { per }: Pick<SheetForm, 'per'>,
  layout: BoreLayout,
  written: readonly { readonly position: string; readonly source?: unknown }[],
): readonly Position[] => (per === 'degree' ? degreeRows(written) : rowsFor(per, layout));
