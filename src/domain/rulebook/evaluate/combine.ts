import type { PositionResult, State } from '../clause-result';

// The first state that stands anywhere stands for the clause: a shown breach before what is open.
const ORDER: readonly State[] = [
  'does-not-comply',
  'outside',
  'could-not-be-reached',
  'not-measured',
  'no-statement',
  'too-close',
  'judged',
  'waived',
  'within',
  'complies',
];

const WORDS: Readonly<Record<State, string>> = {
  within: 'within',
  outside: 'outside',
  'too-close': 'too close to call',
  'not-measured': 'not measured',
  'could-not-be-reached': 'could not be reached',
  'no-statement': 'without a statement',
  complies: 'complies',
  'does-not-comply': 'does not comply',
  judged: 'for the officials to judge',
  waived: 'waived',
};

export interface Combined {
  readonly state: State;
  readonly pass: boolean | null;
  readonly fit: boolean | null;
  readonly sentence: string;
}

const passOf = (results: readonly PositionResult[]): boolean | null => {
  if (results.some((result) => result.pass === false)) return false;
  return results.length > 0 && results.every((result) => result.pass === true) ? true : null;
};

const fitOf = (results: readonly PositionResult[]): boolean | null => {
  const known = results.filter((result) => result.fit !== null);
  return known.length === 0 ? null : known.every((result) => result.fit === true);
};

/** A breach shown at one position is one for the clause; a pass needs every position. */
export const combine = (results: readonly PositionResult[]): Combined => {
  const count = (state: State) => results.filter((result) => result.state === state).length;
  const pass = passOf(results);
  const failed = results.filter((result) => result.pass === false);
  const ground = failed.length > 0 ? failed : results;
  const state =
    ORDER.find((name) => ground.some((result) => result.state === name)) ?? 'not-measured';
  const [only] = results;
  const counts = ORDER.filter((name) => count(name) > 0).map(
    (name) => `${count(name)} of ${results.length} ${WORDS[name]}`,
  );
  return {
    state,
    pass,
    fit: fitOf(results),
    sentence: results.length === 1 && only !== undefined ? only.sentence : `${counts.join(', ')}.`,
  };
};
