import type { DrawCommitment, DrawMade } from '@/domain/draw/documents';
import type { DrawState } from '@/domain/draw/history';

type Announced = DrawCommitment['values'][number];

/** What happens if a value does not come about. */
export const missingWords = ({ ifMissing, substitute }: Announced): string => {
  if (ifMissing === 'left-out') return 'If it does not come about, it is left out.';
  return ifMissing === 'void'
    ? 'If it does not come about, the draw is void.'
    : `If it does not come about: ${substitute}.`;
};

/** Where a published value came from. */
export const sourceWords = (
  { source }: DrawMade['values'][number],
  announced: Announced | undefined,
): string => {
  if (source === 'missing') return 'did not come about, left out as announced';
  return source === 'announced'
    ? 'as announced'
    : `did not come about, in its place: ${announced?.substitute ?? 'the substitute'}`;
};

/** Where the draw of a class stands, in a few words. */
export const stateWords = (state: DrawState): string => {
  switch (state.at) {
    case 'none':
      return 'not announced';
    case 'committed':
      return `announced: ${state.commitment.select} of ${state.commitment.pool.length} cars`;
    case 'made':
      return `drawn: ${state.made.selected.map(({ car }) => car).join(', ')}`;
    case 'void':
      return 'declared void';
  }
};

export const carsWords = (count: number): string => (count === 1 ? '1 car' : `${count} cars`);

/** Values that come about at any track, with no timing system. */
export const VALUE_IDEAS: readonly string[] = [
  'Two dice, thrown three times by a competitor at the drivers’ meeting: the sum of each throw',
  'Laps completed by each car in the feature, as the scorer reads them out',
  'Fastest lap of the feature, every car that has one, in thousandths of a second',
  'The next public lottery draw after the meeting: every number drawn',
];
