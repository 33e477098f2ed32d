import type { LimitRequirement, LimitRounding } from '@/domain/rulebook/limit';
import { getQuantityEntry } from '@/domain/rulebook/quantity-catalogue';
import { SelectField } from '../fields/SelectField';
import { WrittenField } from '../fields/WrittenField';

interface RoundingFieldsProps {
  readonly value: LimitRequirement;
  readonly onChange: (value: LimitRequirement) => void;
}

/** "Rounded up" favours one side or the other: the rule says what is rounded. */
export const RoundingFields = ({ value, onChange }: RoundingFieldsProps) => {
  const { dimension } = getQuantityEntry(value.quantity);
  const { rounding, ...unrounded } = value;
  const set = (change: Partial<LimitRounding>) =>
    onChange({
      ...value,
      rounding: {
        of: 'measured',
        direction: 'nearest',
        step: { text: '', unit: value.unit },
        ...rounding,
        ...change,
      },
    });
  return (
    <>
      <SelectField
        at="/requirement/rounding"
        label="Rounding that the rule states"
        value={rounding?.of ?? ''}
        options={[
          { value: '', label: 'None' },
          { value: 'limit', label: 'The limit is rounded' },
          { value: 'measured', label: 'The measured value is rounded' },
        ]}
        onChange={(of) =>
          of === '' ? onChange(unrounded) : set({ of: of as LimitRounding['of'] })
        }
      />
      {rounding !== undefined && (
        <>
          <SelectField
            at="/requirement/rounding/direction"
            label="Which way"
            value={rounding.direction}
            options={[
              { value: 'up', label: 'Up' },
              { value: 'down', label: 'Down' },
              { value: 'nearest', label: 'To the nearest' },
            ]}
            onChange={(way) => set({ direction: way as LimitRounding['direction'] })}
          />
          <WrittenField
            at="/requirement/rounding/step"
            label="To the step of"
            dimension={dimension}
            unit={value.unit}
            value={rounding.step}
            onChange={(step) => set({ step: step ?? { text: '', unit: value.unit } })}
          />
        </>
      )}
    </>
  );
};
