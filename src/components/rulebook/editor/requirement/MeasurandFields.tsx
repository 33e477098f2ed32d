import { dimensionWords } from '@/domain/quantity/dimension';
import { unitSymbols } from '@/domain/quantity/find-unit';
import type { Measurand } from '@/domain/rulebook/limit';
import type { Source } from '@/domain/rulebook/quantities/entry';
import {
  getQuantityEntry,
  isQuantityName,
  QUANTITY_NAMES,
  type QuantityName,
} from '@/domain/rulebook/quantity-catalogue';
import { SelectField } from '../fields/SelectField';
import { TextField } from '../fields/TextField';
import { WrittenField } from '../fields/WrittenField';

const SHEET: Readonly<Record<Source, string>> = {
  'lifter-sheet': 'Tappets',
  'cam-sheet': 'Camshaft',
  'engine-sheet': 'Engine',
  'weight-sheet': 'Weights',
};

const QUANTITIES = QUANTITY_NAMES.map((value) => {
  const { label, source } = getQuantityEntry(value);
  return { value, label, group: SHEET[source] };
});

const FIGURES = [
  { value: '', label: 'Not said yet' },
  { value: 'mean', label: 'The mean of the readings' },
  { value: 'smallest', label: 'The smallest reading' },
  { value: 'largest', label: 'The largest reading' },
];

const LIFTERS = [
  { value: '', label: 'Not said yet' },
  { value: 'solid', label: 'A solid checking lifter stands in' },
  { value: 'as-fitted', label: 'The lifters stay as fitted' },
];

/** Another quantity: what does not belong to it is no longer stated. */
const withQuantity = <M extends Measurand>(measurand: M, quantity: QuantityName): M => {
  const entry = getQuantityEntry(quantity);
  const { figure, datum, lash, checkingLifter, ...rest } = measurand;
  return {
    ...rest,
    quantity,
    unit: unitSymbols(entry.dimension).includes(measurand.unit) ? measurand.unit : entry.unit,
    per: entry.per,
    ...(entry.needsFigure && { figure }),
    ...(entry.needsDatum && { datum }),
    ...(entry.needsLash && { lash, checkingLifter }),
  } as unknown as M;
};

interface MeasurandFieldsProps<M> {
  readonly value: M;
  readonly onChange: (value: M) => void;
}

/** What is measured, and where: the quantity decides which of these there are. */
export const MeasurandFields = <M extends Measurand>({
  value,
  onChange,
}: MeasurandFieldsProps<M>) => {
  const entry = getQuantityEntry(value.quantity);
  return (
    <>
      <SelectField
        at="/requirement/quantity"
        label="Quantity"
        hint={`${dimensionWords(entry.dimension)} per ${entry.per}, from ${entry.from}`}
        value={value.quantity}
        options={QUANTITIES}
        onChange={(name) => isQuantityName(name) && onChange(withQuantity(value, name))}
      />
      <SelectField
        at="/requirement/unit"
        label="Results are stated in"
        value={value.unit}
        options={unitSymbols(entry.dimension).map((unit) => ({
          value: unit,
          label: unit === '1' ? 'no unit' : unit,
        }))}
        onChange={(unit) => onChange({ ...value, unit })}
      />
      {entry.needsFigure && (
        <SelectField
          at="/requirement/figure"
          label="Which figure counts"
          value={value.figure ?? ''}
          options={FIGURES}
          onChange={(figure) => onChange({ ...value, figure: figure === '' ? undefined : figure })}
        />
      )}
      {entry.needsDatum && (
        <TextField
          at="/requirement/datum"
          label="Datum"
          hint="Where, and at what, it is measured, such as: at the pushrod"
          value={value.datum ?? ''}
          onChange={(datum) => onChange({ ...value, datum })}
        />
      )}
      {entry.needsLash && (
        <>
          <WrittenField
            at="/requirement/lash"
            label="Lash"
            dimension="length"
            unit="in"
            value={value.lash}
            onChange={(lash) => onChange({ ...value, lash })}
          />
          <SelectField
            at="/requirement/checkingLifter"
            label="Checking lifter"
            value={value.checkingLifter ?? ''}
            options={LIFTERS}
            onChange={(lifter) =>
              onChange({ ...value, checkingLifter: lifter === '' ? undefined : lifter })
            }
          />
        </>
      )}
    </>
  );
};
