import type { Fault } from '../../failure';
import type { Bulletin, ClauseChange } from '../bulletin';
import { type Clause, findParentNumber, sortClauses } from '../clause';
import type { PenaltyRow } from '../edition';
import { at, isBlank, when } from './check';
import { findAmbiguities } from './find-ambiguities';

/** The clauses once the changes are made, in the tree's order. */
export const withChanges = (
  clauses: readonly Clause[],
  changes: readonly ClauseChange[],
): readonly Clause[] => {
  const standing = new Map(clauses.map((clause) => [clause.number, clause]));
  for (const change of changes) {
    if (change.kind === 'withdraw') standing.delete(change.number);
    else standing.set(change.clause.number, change.clause);
  }
  return sortClauses([...standing.values()]);
};

const changeFaults = (
  change: ClauseChange,
  pointer: string,
  clauses: readonly Clause[],
  after: readonly Clause[],
): readonly Fault[] => {
  const number = change.kind === 'withdraw' ? change.number : change.clause.number;
  const stands = clauses.some((clause) => clause.number === number);
  const below = after.find((clause) => findParentNumber(clause.number) === number);
  return [
    ...when(
      change.kind === 'add' && stands,
      pointer,
      `Clause ${number} exists already: replace it, or give the new one another number.`,
    ),
    ...when(change.kind !== 'add' && !stands, pointer, `There is no clause ${number} in force.`),
    ...when(
      change.kind === 'withdraw' && below !== undefined,
      pointer,
      `Clause ${below?.number ?? ''} stands below ${number}: withdraw it too.`,
    ),
  ];
};

/**
 * Everything that keeps a bulletin from being published onto the clauses in force: pointers into the
 * bulletin where the fault is in a change, with the clause's number in words where it is in what
 * the rules would become.
 */
export const findBulletinFaults = (
  bulletin: Pick<Bulletin, 'title' | 'reason' | 'changes' | 'effective'>,
  rules: { readonly clauses: readonly Clause[]; readonly penalties: readonly PenaltyRow[] },
  publishedAt: string,
): readonly Fault[] => {
  const after = withChanges(rules.clauses, bulletin.changes);
  const place = (clause: Clause | undefined): string => {
    const index = bulletin.changes.findLastIndex(
      (change) => change.kind !== 'withdraw' && change.clause === clause,
    );
    return index < 0 ? '/changes' : `/changes/${index}/clause`;
  };
  const resulting = findAmbiguities(after, rules.penalties).map(({ pointer, detail }) => {
    const [, , index = '', ...rest] = pointer.split('/');
    const clause = after[Number(index)];
    const own = place(clause);
    return own === '/changes'
      ? at(own, `Clause ${clause?.number ?? ''}: ${detail}`)
      : at([own, ...rest].join('/'), detail);
  });
  const { effective } = bulletin;
  return [
    ...when(isBlank(bulletin.title), '/title', 'The bulletin needs a title.'),
    ...when(isBlank(bulletin.reason), '/reason', 'Say why: the reason is published.'),
    ...when(bulletin.changes.length === 0, '/changes', 'The bulletin changes nothing.'),
    ...when(
      effective.kind === 'instant' && Date.parse(effective.at) < Date.parse(publishedAt),
      '/effective/at',
      'A bulletin cannot count before it is published.',
    ),
    ...bulletin.changes.flatMap((change, i) =>
      changeFaults(change, `/changes/${i}`, rules.clauses, after),
    ),
    ...resulting,
  ];
};
