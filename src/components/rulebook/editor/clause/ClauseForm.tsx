import { useRef } from 'react';
import type { Fault } from '@/domain/failure';
import { type Clause, type Force, isClauseNumber } from '@/domain/rulebook/clause';
import type { Requirement } from '@/domain/rulebook/requirement';
import { FaultsHere, Group } from '../fields/faults';
import { RowsField } from '../fields/RowsField';
import { SelectField } from '../fields/SelectField';
import { ReadField, TextField } from '../fields/TextField';
import { isKind, KIND_WORDS, newRequirement } from '../requirement/new-requirement';
import { RequirementForm } from '../requirement/RequirementForm';
import { unsaidNumbers } from './unsaid-numbers';

const FORCES = [
  { value: 'mandatory', label: 'Mandatory: a breach can be decided on it' },
  { value: 'advisory', label: 'Advisory: it warns and disqualifies nobody' },
  { value: 'judged', label: 'Judged by the officials: nothing can check it' },
  { value: 'text', label: 'Plain text' },
];

const KINDS = [
  { value: '', label: 'Nothing checks it' },
  ...Object.entries(KIND_WORDS).map(([value, label]) => ({ value, label })),
];

const readNumber = (text: string): string | undefined =>
  isClauseNumber(text.trim()) ? text.trim() : undefined;

const readRefs = (text: string): readonly string[] | undefined => {
  const numbers = text.split(/[\s,;]+/).filter((part) => part !== '');
  return numbers.every(isClauseNumber) ? numbers : undefined;
};

interface ClauseFormProps {
  readonly clause: Clause;
  /** Pointers begin within the clause. */
  readonly faults: readonly Fault[];
  readonly penaltyRows: readonly string[];
  readonly onChange: (clause: Clause) => void;
  /** Absent where the number is not for this page to change. */
  readonly onRenumber?: (number: string) => void;
}

/** Everything of one clause, by the kind of its requirement. */
export const ClauseForm = ({ clause, faults, penaltyRows, onChange, ...rest }: ClauseFormProps) => {
  const { onRenumber } = rest;
  // What was entered for another kind comes back when that kind is chosen again.
  const kinds = useRef(new Map<string, Requirement>());
  const { requirement } = clause;
  const unsaid = unsaidNumbers(clause);

  const chooseKind = (kind: string) => {
    if (requirement !== undefined) kinds.current.set(requirement.kind, requirement);
    const { requirement: _before, ...bare } = clause;
    const binding = clause.force === 'mandatory' || clause.force === 'advisory';
    if (!isKind(kind)) return onChange({ ...bare, force: binding ? 'judged' : clause.force });
    onChange({
      ...clause,
      force: binding ? clause.force : 'mandatory',
      requirement: kinds.current.get(kind) ?? newRequirement(kind),
    });
  };

  const penalties = [
    { value: '', label: 'None' },
    ...[...new Set([...penaltyRows, clause.penaltyRow ?? ''])]
      .filter((row) => row !== '')
      .map((row) => ({ value: row, label: `Row ${row}` })),
  ];

  return (
    <FaultsHere.Provider value={faults}>
      {onRenumber && (
        <ReadField
          at="/number"
          label="Number"
          value={clause.number}
          show={String}
          read={readNumber}
          refused="A clause number reads like 7.4.3."
          onChange={onRenumber}
        />
      )}
      <TextField
        at="/heading"
        label="Heading"
        value={clause.heading}
        onChange={(heading) => onChange({ ...clause, heading })}
      />
      <TextField
        at="/words"
        label="Words"
        hint="The rule as people read it"
        long
        value={clause.words}
        onChange={(words) => onChange({ ...clause, words })}
      />
      {unsaid.length > 0 && (
        <p className="note" role="status">
          The words do not say {unsaid.join(' and ')}, which the limit states. Do they still say the
          same?
        </p>
      )}
      <SelectField
        at="/kind"
        label="Checked by"
        value={requirement?.kind ?? ''}
        options={KINDS}
        onChange={chooseKind}
      />
      <SelectField
        at="/force"
        label="Force"
        value={clause.force}
        options={FORCES}
        onChange={(force) => onChange({ ...clause, force: force as Force })}
      />
      {(clause.force === 'mandatory' || clause.force === 'judged' || clause.penaltyRow) && (
        <SelectField
          at="/penaltyRow"
          label="Row of the penalty schedule"
          value={clause.penaltyRow ?? ''}
          options={penalties}
          onChange={(row) => onChange({ ...clause, penaltyRow: row === '' ? undefined : row })}
        />
      )}
      {requirement && (
        <RequirementForm
          value={requirement}
          onChange={(next) => onChange({ ...clause, requirement: next })}
        />
      )}
      <ReadField
        at="/refs"
        label="Leans on clauses"
        hint="Numbers, such as 4.2, 7.1"
        value={clause.refs ?? []}
        show={(refs) => refs.join(', ')}
        read={readRefs}
        refused="Write clause numbers, such as 4.2, 7.1."
        onChange={(refs) => onChange({ ...clause, refs: refs.length === 0 ? undefined : refs })}
      />
      <Group at="/definitions" label="Definitions">
        <RowsField
          rows={clause.definitions ?? []}
          one="definition"
          fresh={{ term: '', meaning: '' }}
          onChange={(rows) =>
            onChange({ ...clause, definitions: rows.length === 0 ? undefined : rows })
          }
          show={(row, change, index) => (
            <>
              <TextField
                at={`/definitions/${index}/term`}
                label="Term"
                value={row.term}
                onChange={(term) => change({ ...row, term })}
              />
              <TextField
                at={`/definitions/${index}/meaning`}
                label="Meaning"
                value={row.meaning}
                onChange={(meaning) => change({ ...row, meaning })}
              />
            </>
          )}
        />
      </Group>
    </FaultsHere.Provider>
  );
};
