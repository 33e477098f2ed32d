import type { PaperworkState } from '../paperwork/state';

/** What is known of one car and engine before the next event. */
export interface WeekendFacts {
  readonly state: PaperworkState;
  /** Remarks on the version that came back. */
  readonly remarks: number;
  /** Mandatory clauses that what is declared does not meet, by the rules in force at the event. */
  readonly breaches: readonly string[];
  /** Advisory clauses that warn. */
  readonly warnings: readonly string[];
  /** Clauses waived for this car or engine. */
  readonly waived: readonly string[];
  /** Whether the rules are others than those it was handed in under. */
  readonly rulesChanged: boolean;
  /** The notice of the last breach found on this engine, and whether its paperwork was changed since. */
  readonly breach?: { readonly notice: string; readonly answered: boolean } | undefined;
}

export type WeekendAnswer = 'nothing-against' | 'waits' | 'not-yet' | 'against';

export interface Weekend {
  readonly answer: WeekendAnswer;
  readonly word: string;
  readonly reasons: readonly string[];
  readonly step: string;
}

const clauses = (numbers: readonly string[]): string =>
  `${numbers.length === 1 ? 'clause' : 'clauses'} ${numbers.join(', ')}`;

const counted = (count: number, word: string): string =>
  `${count} ${word}${count === 1 ? '' : 's'}`;

const STATE: Readonly<
  Record<Exclude<PaperworkState, 'withdrawn'>, Pick<Weekend, 'answer' | 'word' | 'step'>>
> = {
  draft: { answer: 'not-yet', word: 'Not yet', step: 'Go on with it' },
  returned: { answer: 'not-yet', word: 'Not yet', step: 'Put it right' },
  'handed-in': { answer: 'waits', word: 'With the officials', step: 'See what was handed in' },
  accepted: { answer: 'nothing-against', word: 'Nothing against it', step: 'See it' },
};

/**
 * Whether anything stands against a car on paper before the next event, why, and what to do. It speaks of
 * what is declared and decided; only an inspection says what is in the engine.
 */
export const weekendOf = (facts: WeekendFacts): Weekend => {
  const { state, remarks, breaches, warnings, waived, rulesChanged, breach } = facts;
  if (state === 'withdrawn')
    return {
      answer: 'not-yet',
      word: 'Withdrawn',
      reasons: ['It declares nothing.'],
      step: 'See it',
    };
  const base = STATE[state];
  const handed = state === 'handed-in' || state === 'accepted';
  const against = handed && breaches.length > 0;
  const reasons = [
    ...(breach === undefined
      ? []
      : [
          `A breach was found on this engine: notice ${breach.notice}${breach.answered ? ', before this paperwork' : ''}.`,
        ]),
    ...(state === 'draft' ? ['It is not handed in.'] : []),
    ...(state === 'returned' ? [`It came back with ${counted(remarks, 'remark')}.`] : []),
    ...(breaches.length > 0 ? [`What is declared does not meet ${clauses(breaches)}.`] : []),
    ...(handed && rulesChanged
      ? [
          breaches.length > 0
            ? 'The rules changed since it was handed in.'
            : 'The rules changed since it was handed in; it meets them as they are now.',
        ]
      : []),
    ...(warnings.length > 0
      ? [`Advice only: ${clauses(warnings)} ${warnings.length === 1 ? 'warns' : 'warn'}.`]
      : []),
    ...(waived.length > 0 ? [`Waived: ${clauses(waived)}.`] : []),
  ];
  if (handed && breach?.answered === false)
    return { answer: 'against', word: 'Breach found', reasons, step: 'See what was declared' };
  return against
    ? { answer: 'against', word: 'Not as declared', reasons, step: 'See which clause' }
    : { ...base, reasons };
};
