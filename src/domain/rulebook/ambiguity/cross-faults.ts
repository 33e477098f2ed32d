import type { Fault } from '../../failure';
import type { Clause } from '../clause';
import type { PenaltyRow } from '../edition';
import type { Requirement } from '../requirement';
import { at } from './check';

const optionsKey = (requirement: Requirement | undefined): string | undefined => {
  if (requirement?.kind === 'choice')
    return `choice ${requirement.per} ${requirement.options.map((option) => option.value).join(' ')}`;
  return requirement?.kind === 'yes-no' ? `yes-no ${requirement.per}` : undefined;
};

/** What can only be seen with all clauses side by side. */
export const crossFaults = (
  clauses: readonly Clause[],
  penalties: readonly PenaltyRow[],
): readonly Fault[] => {
  const first = new Map<string, number>();
  const meanings = new Map<string, string>();
  const asked = new Map<string, string>();
  const numbers = new Set(clauses.map((clause) => clause.number));
  const rows = new Set(penalties.map((row) => row.row));
  return clauses.flatMap((clause, index) => {
    const pointer = `/clauses/${index}`;
    const faults: Fault[] = [];
    if (first.has(clause.number))
      faults.push(at(`${pointer}/number`, `There are two clauses ${clause.number}.`));
    else first.set(clause.number, index);
    for (const [i, ref] of (clause.refs ?? []).entries()) {
      if (!numbers.has(ref))
        faults.push(at(`${pointer}/refs/${i}`, `There is no clause ${ref} to refer to.`));
      else if (ref === clause.number)
        faults.push(at(`${pointer}/refs/${i}`, 'The clause refers to itself.'));
    }
    for (const [i, { term, meaning }] of (clause.definitions ?? []).entries()) {
      const key = term.trim().toLowerCase();
      if ((meanings.get(key) ?? meaning) !== meaning)
        faults.push(at(`${pointer}/definitions/${i}`, `"${term}" is defined twice, differently.`));
      meanings.set(key, meaning);
    }
    if (clause.penaltyRow !== undefined && !rows.has(clause.penaltyRow))
      faults.push(
        at(`${pointer}/penaltyRow`, `The penalty schedule has no row ${clause.penaltyRow}.`),
      );
    const requirement = clause.requirement;
    const key = optionsKey(requirement);
    if (key !== undefined && (requirement?.kind === 'choice' || requirement?.kind === 'yes-no')) {
      if ((asked.get(requirement.subject) ?? key) !== key)
        faults.push(
          at(
            `${pointer}/requirement/subject`,
            `Another clause asks "${requirement.subject}" with other answers or per another part.`,
          ),
        );
      asked.set(requirement.subject, key);
    }
    return faults;
  });
};
