import type { Fault } from '@/domain/failure';
import type { PenaltyRow } from '@/domain/rulebook/edition';
import { FaultsHere, Group } from '../fields/faults';
import { RowsField } from '../fields/RowsField';
import { CheckField } from '../fields/SelectField';
import { TextField } from '../fields/TextField';

interface PenaltyFormProps {
  readonly penalties: readonly PenaltyRow[];
  readonly faults: readonly Fault[];
  readonly onChange: (penalties: readonly PenaltyRow[]) => void;
}

const fresh: PenaltyRow = { row: '', breach: '', penalties: [''], carriesOver: false };

/** The penalty schedule: each row says what the first, second and later breaches cost. */
export const PenaltyForm = ({ penalties, faults, onChange }: PenaltyFormProps) => (
  <FaultsHere.Provider value={faults}>
    <RowsField
      rows={penalties}
      one="row"
      fresh={fresh}
      onChange={onChange}
      show={(row, change, index) => (
        <Group at={`/penalties/${index}`} label={`Row ${row.row}`}>
          <TextField
            at={`/penalties/${index}/row`}
            label="Name"
            value={row.row}
            maxLength={60}
            onChange={(name) => change({ ...row, row: name })}
          />
          <TextField
            at={`/penalties/${index}/breach`}
            label="For which breaches"
            value={row.breach}
            onChange={(breach) => change({ ...row, breach })}
          />
          <Group at={`/penalties/${index}/penalties`} label="What it costs">
            <RowsField
              rows={row.penalties}
              one="step"
              fresh=""
              onChange={(steps) => change({ ...row, penalties: steps })}
              show={(step, changeStep, at) => (
                <TextField
                  at={`/penalties/${index}/penalties/${at}`}
                  label={at === 0 ? 'First breach' : `Breach ${at + 1}`}
                  value={step}
                  onChange={changeStep}
                />
              )}
            />
          </Group>
          <CheckField
            label="Breaches count on into the next season"
            checked={row.carriesOver}
            onChange={(carriesOver) => change({ ...row, carriesOver })}
          />
        </Group>
      )}
    />
  </FaultsHere.Provider>
);
