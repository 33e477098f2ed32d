import type { WantedSheet } from './sheet-cell';

/** A row, column or sheet that could not be used, by its place in the file, and what to do about it. */
export interface SheetNote {
  readonly where: string;
  readonly detail: string;
  /** The row of the file it speaks of, from 0; absent where it speaks of more. */
  readonly row?: number | undefined;
}

const wordsFor = ({ form }: WantedSheet) => {
  if (form.per === 'degree')
    return {
      row: 'a crankshaft angle',
      place: 'crankshaft angle',
      none: 'crankshaft angle',
      example: '“110” under a heading such as “Degrees”',
    };
  const [place, example] = form.per === 'cylinder' ? ['cylinder', '“3”'] : ['bore', '“3 intake”'];
  return { row: 'a place on this engine', place, none: `${place} of this engine`, example };
};

export const withoutPlaces = (wanted: WantedSheet): SheetNote => {
  const { row, example } = wordsFor(wanted);
  return {
    where: 'The whole file',
    detail: `No row names ${row}, such as ${example}. Start from the template.`,
  };
};

export const unplaced = (name: string, wanted: WantedSheet): Pick<SheetNote, 'detail'> => {
  const { place, none, example } = wordsFor(wanted);
  return {
    detail:
      name === ''
        ? `It does not say which ${place} it is for. Write it such as ${example}; its values were not taken.`
        : `“${name}” is no ${none}. Write it such as ${example}; its values were not taken.`,
  };
};
