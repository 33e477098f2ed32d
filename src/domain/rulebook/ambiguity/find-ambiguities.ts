import type { Fault } from '../../failure';
import { type Clause, isClauseNumber } from '../clause';
import type { PenaltyRow } from '../edition';
import type { Requirement } from '../requirement';
import { isBlank, when } from './check';
import { requirementFaults } from './check-faults';
import { crossFaults } from './cross-faults';
import { penaltyFaults } from './penalty-faults';

const ROUNDS = /\bround(?:ed|ing|s)?\s+(?:up|down|off)\b/i;

const saysRounding = (requirement: Requirement | undefined): boolean =>
  requirement?.kind !== 'limit' ||
  requirement.rounding !== undefined ||
  requirement.comparison.method === 'rounded';

const forceFaults = (clause: Clause, pointer: string): readonly Fault[] => {
  const binding = clause.force === 'mandatory' || clause.force === 'advisory';
  return [
    ...when(
      binding && clause.requirement === undefined,
      `${pointer}/force`,
      'No requirement checks this clause: mark it as judged by the officials, or as plain text.',
    ),
    ...when(
      !binding && clause.requirement !== undefined,
      `${pointer}/force`,
      'A requirement checks this clause: mark it as mandatory or advisory.',
    ),
    ...when(
      clause.penaltyRow !== undefined && (clause.force === 'advisory' || clause.force === 'text'),
      `${pointer}/penaltyRow`,
      'An advisory clause and plain text carry no penalty.',
    ),
  ];
};

const clauseFaults = (clause: Clause, pointer: string): readonly Fault[] => [
  ...when(
    !isClauseNumber(clause.number),
    `${pointer}/number`,
    'A clause number is whole numbers joined by full stops, such as 7.4.3.',
  ),
  ...when(isBlank(clause.heading), `${pointer}/heading`, 'The clause needs a heading.'),
  ...when(
    isBlank(clause.words) && clause.force !== 'text',
    `${pointer}/words`,
    'The clause needs its words: they are the rule that people read.',
  ),
  ...forceFaults(clause, pointer),
  ...when(
    ROUNDS.test(clause.words) && !saysRounding(clause.requirement),
    `${pointer}/requirement/rounding`,
    'The words round: say whether the limit or the measured value is rounded. They favour opposite sides.',
  ),
  ...(clause.requirement === undefined
    ? []
    : requirementFaults(clause.requirement, `${pointer}/requirement`)),
];

/**
 * Everything that keeps a rulebook from being published, each at its place (JSON Pointers into
 * `{ clauses, penalties }`) and in words that say how to mend it. Empty: it can be published.
 */
export const findAmbiguities = (
  clauses: readonly Clause[],
  penalties: readonly PenaltyRow[] = [],
): readonly Fault[] => [
  ...when(clauses.length === 0, '/clauses', 'A rulebook needs at least one clause.'),
  ...clauses.flatMap((clause, index) => clauseFaults(clause, `/clauses/${index}`)),
  ...crossFaults(clauses, penalties),
  ...penaltyFaults(penalties),
];
