import { getUnit } from '../../quantity/find-unit';
import type { SheetRow } from '../../rulebook/form/form';
import { getQuantityEntry } from '../../rulebook/quantity-catalogue';
import { LOBES } from '../cam/cam-place';
import { sheetRows } from './positions';
import type { WantedSheet } from './sheet-cell';

const IN_MILLIMETRES: Readonly<Record<string, string>> = {
  in: 'mm',
  'in²': 'mm²',
  'in³': 'cc',
  lb: 'kg',
  lbf: 'N',
};

export type UnitSystem = 'inch' | 'metric';

/** Whose sheet it is, so that a printed or mailed one can be told from others. */
export interface TemplateFor {
  readonly carNumber: string;
  readonly reference: string;
  readonly className: string;
  readonly paperworkId: string;
}

export interface SheetTemplate {
  /** Lines above the table, each in one cell. */
  readonly notes: readonly string[];
  readonly heading: readonly string[];
  /** The place of each row. */
  readonly places: readonly string[];
}

/** A sheet to fill in: a heading with units, and a row for every place on this engine. */
export const sheetTemplate = (
  { form, layout }: WantedSheet,
  about: TemplateFor,
  system: UnitSystem,
): SheetTemplate => {
  const lobes = form.per === 'degree' ? LOBES : [];
  const headings = form.columns.flatMap(({ quantity, label, unit }) => {
    const chosen = system === 'metric' ? (IN_MILLIMETRES[unit] ?? unit) : unit;
    const { symbol } = getUnit(getQuantityEntry(quantity).dimension, chosen);
    const title = symbol === '1' ? label : `${label} (${symbol})`;
    return lobes.length === 0 ? [title] : lobes.map((lobe) => `${lobe} ${title}`);
  });
  const firsts: Partial<Record<SheetRow, string>> = {
    cylinder: 'Cylinder',
    degree: 'Crankshaft degrees',
  };
  return {
    notes: [
      `${form.title}. Car number: ${about.carNumber}. Engine: ${about.reference}. Class: ${about.className}.`,
      `Paperwork: ${about.paperworkId}`,
      'Leave empty what was not measured. Units stand in the heading; a unit written in a cell goes before it.',
      form.per === 'degree'
        ? 'Degrees are those of the crankshaft, rising from row to row; write your own in their place.'
        : 'Several readings at one place: copy the column and say where in its heading, “above across” or “below along”.',
    ],
    heading: [firsts[form.per] ?? 'Position', ...headings],
    places: sheetRows(form, layout, []).map((place) => place.key),
  };
};

/** Rows of text, the notes first. */
export const templateRows = ({
  notes,
  heading,
  places,
}: SheetTemplate): readonly (readonly string[])[] => [
  ...notes.map((note) => [note]),
  [],
  heading,
  ...places.map((place) => [place, ...heading.slice(1).map(() => '')]),
];
