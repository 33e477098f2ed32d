import type { State } from '@/domain/rulebook/clause-result';

/** What a mark can say. Each differs in colour, outline, fill and word. */
export type Status =
  | 'within'
  | 'outside'
  | 'too-close'
  | 'not-measured'
  | 'could-not-be-reached'
  | 'set-aside'
  | 'unreadable';

export const statusWord: Readonly<Record<Status, string>> = {
  within: 'within',
  outside: 'outside',
  'too-close': 'too close to call',
  'not-measured': 'not measured',
  'could-not-be-reached': 'could not be reached',
  'set-aside': 'set aside',
  unreadable: 'unreadable',
};

/** The mark and the word of a clause's state: seven marks serve ten states, the words keep them apart. */
const ofState: Readonly<Record<State, readonly [Status, string]>> = {
  within: ['within', statusWord.within],
  outside: ['outside', statusWord.outside],
  'too-close': ['too-close', statusWord['too-close']],
  'not-measured': ['not-measured', statusWord['not-measured']],
  'could-not-be-reached': ['could-not-be-reached', statusWord['could-not-be-reached']],
  'no-statement': ['set-aside', 'no statement: gauge not fit for this rule'],
  complies: ['within', 'complies'],
  'does-not-comply': ['outside', 'does not comply'],
  judged: ['not-measured', 'for the officials to judge'],
  waived: ['set-aside', 'waived'],
};

export const markOfState = (state: State): Status => ofState[state][0];
export const wordOfState = (state: State): string => ofState[state][1];
