import { type Failure, failure } from '../failure';
import { fail, ok, type Result } from '../result';

/**
 * Where an inspection stands. `held-hot`: parts are left to settle and measured again. A refused,
 * stopped or deferred teardown is still this inspection; it is opened again, here or elsewhere.
 */
export type InspectionState =
  | 'to-do'
  | 'open'
  | 'held-hot'
  | 'refused'
  | 'stopped'
  | 'deferred'
  | 'closed';

export type InspectionAct =
  | 'open'
  | 'hold'
  | 'resume'
  | 'refuse'
  | 'stop'
  | 'defer'
  | 'close'
  | 'correct';

type Row = Readonly<Partial<Record<InspectionAct, InspectionState>>>;

export const TRANSITIONS: Readonly<Record<InspectionState, Row>> = {
  'to-do': { open: 'open', refuse: 'refused', defer: 'deferred' },
  open: {
    hold: 'held-hot',
    refuse: 'refused',
    stop: 'stopped',
    defer: 'deferred',
    close: 'closed',
  },
  'held-hot': { resume: 'open', refuse: 'refused', stop: 'stopped', defer: 'deferred' },
  stopped: { resume: 'open', refuse: 'refused', close: 'closed' },
  deferred: { resume: 'open', refuse: 'refused' },
  refused: { resume: 'open', close: 'closed' },
  closed: { correct: 'closed' },
};

export const STATE_WORDS: Readonly<Record<InspectionState, string>> = {
  'to-do': 'to do',
  open: 'open',
  'held-hot': 'held until parts have settled',
  refused: 'teardown refused',
  stopped: 'stopped',
  deferred: 'deferred',
  closed: 'signed and closed',
};

const ACT_WORDS: Readonly<Record<InspectionAct, string>> = {
  open: 'opened',
  hold: 'held',
  resume: 'taken up again',
  refuse: 'refused',
  stop: 'stopped',
  defer: 'deferred',
  close: 'closed',
  correct: 'corrected',
};

const NEEDS_REASON: readonly InspectionAct[] = ['hold', 'refuse', 'stop', 'defer', 'correct'];

export const needsReason = (act: InspectionAct): boolean => NEEDS_REASON.includes(act);

/** The acts that are open from here, in the table's order. */
export const actsFrom = (state: InspectionState): readonly InspectionAct[] => {
  const row = TRANSITIONS[state];
  return (Object.keys(ACT_WORDS) as InspectionAct[]).filter((act) => row[act] !== undefined);
};

/** The state after an act; a failure where the act is not open, or lacks its reason. */
export const nextState = (
  state: InspectionState,
  act: InspectionAct,
  reason: string,
): Result<InspectionState, Failure> => {
  const next = TRANSITIONS[state][act];
  if (next === undefined)
    return fail(
      failure(
        'not-in-this-state',
        `This inspection is ${STATE_WORDS[state]}; it cannot be ${ACT_WORDS[act]} now.`,
      ),
    );
  if (needsReason(act) && reason.trim() === '')
    return fail(
      failure('invalid', `Write why the inspection is ${ACT_WORDS[act]}.`, [
        { pointer: '/reason', detail: 'A reason is needed.' },
      ]),
    );
  return ok(next);
};

/** Readings and checks are accepted while it is open or held; at other times they are kept as received. */
export const acceptsReadings = (state: InspectionState): boolean =>
  state === 'open' || state === 'held-hot';
