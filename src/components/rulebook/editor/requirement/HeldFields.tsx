import type { DecisionRule } from '@/domain/decision/decision-rule';
import type { HeldAgainst, Measurand } from '@/domain/rulebook/limit';
import { getQuantityEntry } from '@/domain/rulebook/quantity-catalogue';
import { SelectField } from '../fields/SelectField';
import { ReadField, TextField, WholeField } from '../fields/TextField';
import { WrittenField } from '../fields/WrittenField';

const RULES = [
  { value: 'guarded-rejection', label: 'Fails only when a breach is shown' },
  { value: 'guarded-acceptance', label: 'Passes only when compliance is shown' },
  { value: 'simple', label: 'The measured value decides' },
  { value: 'iso14253', label: 'Each only when shown (ISO 14253-1)' },
  { value: 'conformance-probability', label: 'Passes at a stated probability' },
  { value: 'ilac-g8-four', label: 'Four statements (ILAC-G8:09/2019)' },
];

const ruleOf = (kind: string): DecisionRule =>
  kind === 'conformance-probability'
    ? { kind, probability: 0.95 }
    : ({ kind } as Exclude<DecisionRule, { kind: 'conformance-probability' }>);

const readProbability = (text: string): number | undefined => {
  const value = Number(text.trim().replace(',', '.'));
  return text.trim() !== '' && value > 50 && value < 100 ? value / 100 : undefined;
};

const percent = (probability: number): string => String(Number((probability * 100).toPrecision(6)));

interface HeldFieldsProps<H> {
  readonly value: H;
  readonly onChange: (value: H) => void;
}

/** How a measured value is held against the limit. */
export const HeldFields = <H extends HeldAgainst & Measurand>({
  value,
  onChange,
}: HeldFieldsProps<H>) => {
  const { dimension } = getQuantityEntry(value.quantity);
  const { decisionRule: rule, comparison } = value;
  const guarded = rule.kind === 'guarded-rejection' || rule.kind === 'guarded-acceptance';
  return (
    <>
      <SelectField
        at="/requirement/decisionRule"
        label="Decision rule"
        value={rule.kind}
        options={RULES}
        onChange={(kind) => onChange({ ...value, decisionRule: ruleOf(kind) })}
      />
      {guarded && (
        <TextField
          at="/requirement/decisionRule/guardFactor"
          label="Guard band, as a factor of U"
          hint="Left empty, the guard band is for 95 %"
          value={rule.guardFactor ?? ''}
          num
          onChange={(text) => {
            const { guardFactor: _before, ...rest } = rule;
            const decisionRule = text === '' ? rest : { kind: rule.kind, guardFactor: text };
            onChange({ ...value, decisionRule });
          }}
        />
      )}
      {rule.kind === 'conformance-probability' && (
        <ReadField
          at="/requirement/decisionRule/probability"
          label="Probability, in %"
          value={rule.probability}
          show={percent}
          read={readProbability}
          refused="Write a number between 50 and 100."
          num
          onChange={(probability) => onChange({ ...value, decisionRule: { ...rule, probability } })}
        />
      )}
      <SelectField
        at="/requirement/comparison"
        label="Compared"
        value={comparison.method}
        options={[
          { value: 'absolute', label: 'As measured' },
          { value: 'rounded', label: 'Rounded first' },
        ]}
        onChange={(method) =>
          onChange({
            ...value,
            comparison: method === 'rounded' ? { method, decimals: 4 } : { method: 'absolute' },
          })
        }
      />
      {comparison.method === 'rounded' && (
        <WholeField
          at="/requirement/comparison/decimals"
          label="To how many decimals"
          value={comparison.decimals}
          onChange={(decimals) =>
            onChange({ ...value, comparison: { method: 'rounded', decimals } })
          }
        />
      )}
      <TextField
        at="/requirement/fitRatio"
        label="Fitness number"
        hint="The window is at least this many times 2U; empty: not asked"
        value={value.fitRatio ?? ''}
        num
        onChange={(text) => onChange({ ...value, fitRatio: text === '' ? undefined : text })}
      />
      <WrittenField
        at="/requirement/maximumUncertainty"
        label="Largest allowed uncertainty U"
        hint="Empty: not asked"
        dimension={dimension}
        unit={value.unit}
        value={value.maximumUncertainty}
        onChange={(maximumUncertainty) => onChange({ ...value, maximumUncertainty })}
      />
      <WrittenField
        at="/requirement/ringCheck"
        label="A gauge past its due day counts when it read the ring that night to within"
        hint="Empty: it never counts for a breach"
        dimension="length"
        unit="in"
        value={value.ringCheck}
        onChange={(ringCheck) => onChange({ ...value, ringCheck })}
      />
    </>
  );
};
