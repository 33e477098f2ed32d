import type { WantedSheet } from './sheet-cell';

/** A row, column or sheet that could not be used, by its place in the file, and what to do about it. */
export interface SheetNote {
  readonly where: string;
  readonly detail: string;
  /** The row of the file it speaks of, from 0; absent where it speaks of more. */
  readonly row?: number | undefined;
}

const wordsFor = ({ form }: WantedSheet) =>
  form.per === 'cylinder'
    ? { place: 'cylinder', example: '“3”' }
    : { place: 'bore', example: '“3 intake”' };

export const withoutPlaces = (wanted: WantedSheet): SheetNote => ({
  where: 'The whole file',
  detail: `No row names a place on this engine, such as ${wordsFor(wanted).example}. Start from the template.`,
});

export const unplaced = (name: string, wanted: WantedSheet): Pick<SheetNote, 'detail'> => {
  const { place, example } = wordsFor(wanted);
  return {
    detail:
      name === ''
        ? `It does not say which ${place} it is for. Write it such as ${example}; its values were not taken.`
        : `“${name}” is no ${place} of this engine. Write it such as ${example}; its values were not taken.`,
  };
};
