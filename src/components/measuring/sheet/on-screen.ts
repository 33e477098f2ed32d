import type { InspectionState } from '@/domain/inspection/state';
import { acceptsReadings } from '@/domain/inspection/state';
import { boreName } from '@/domain/tappet/layout/bore-layout';
import type { Bay } from '../bay';
import type { Heard } from '../live/heard';
import { boreStates, checkStates, rackStates, type States } from './bore-states';
import type { Step } from './flow/steps';

/** What Enter does now, under its word. */
export const hintOf = (step: Step | undefined): string | undefined => {
  switch (step?.kind) {
    case 'bore':
      return `on to ${boreName(step.to)}`;
    case 'part':
      return `on to ${step.part.label.toLowerCase()}, ${boreName(step.to)}`;
    case 'checks':
      return 'on to the checks';
    case 'opening':
      return 'opening zero';
    case 'closing':
      return 'closing zero';
    case 'closed':
      return 'zero seen';
    default:
      return undefined;
  }
};

/** What each bore carries on the map. */
export const statesOf = (bay: Bay): States => {
  const { part, positions, checks, assessment, outOfReach, rack, cursor } = bay;
  if (part !== undefined) return boreStates({ ...bay, part });
  return cursor.part === 'rack'
    ? rackStates(rack)
    : checkStates(positions, checks, assessment, outOfReach);
};

interface Told {
  readonly name: string;
  readonly value: string;
  readonly minor?: boolean;
}

/** The cells of the top bar; the last one is what another tablet has just recorded. */
export const factsOf = ({ sheet, gauge }: Bay, heard: Heard | undefined): readonly Told[] => [
  { name: 'Engine', value: sheet.engine, minor: heard !== undefined },
  { name: 'Bay', value: `${sheet.bay || '–'}${sheet.state === 'held-hot' ? ', held' : ''}` },
  { name: 'Inspector', value: sheet.inspector, minor: true },
  ...(gauge === undefined
    ? []
    : [
        {
          name: `${gauge.name} ${gauge.code}`,
          value: gauge.dueOn === undefined ? 'No calibration' : `Calibrated to ${gauge.dueOn}`,
          minor: heard !== undefined,
        },
      ]),
  ...(heard === undefined ? [] : [{ name: `By ${heard.by}`, value: heard.words }]),
];

/** What the inspection's state means for what is entered now; nothing while it is simply open. */
export const stateNoteOf = ({
  state,
  correcting,
}: {
  readonly state: InspectionState;
  readonly correcting: boolean;
}): { readonly title: string; readonly words: string; readonly counts: boolean } | undefined => {
  if (correcting || state === 'open') return undefined;
  if (acceptsReadings(state))
    return {
      title: 'Held until parts have settled',
      words: 'What is read now counts. Read hot bores again once the block has cooled.',
      counts: true,
    };
  return state === 'closed'
    ? {
        title: 'The report is signed and closed',
        words: 'What is entered now is kept and does not count.',
        counts: false,
      }
    : {
        title: 'This inspection is not open',
        words: 'What is entered now is kept and does not count.',
        counts: false,
      };
};
