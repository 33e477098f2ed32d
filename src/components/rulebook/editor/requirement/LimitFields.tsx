import type { LimitRequirement, ReferenceAverageRequirement } from '@/domain/rulebook/limit';
import { getQuantityEntry } from '@/domain/rulebook/quantity-catalogue';
import { Group } from '../fields/faults';
import { SelectField } from '../fields/SelectField';
import { WholeField } from '../fields/TextField';
import { WrittenField } from '../fields/WrittenField';
import { HeldFields } from './HeldFields';
import { MeasurandFields } from './MeasurandFields';
import { RoundingFields } from './RoundingFields';

interface Props<R> {
  readonly value: R;
  readonly onChange: (value: R) => void;
}

const BOUNDS = [
  { value: 'bounds', label: 'A least, a largest, or both' },
  { value: 'nominal', label: 'A nominal with its tolerance' },
];

const TWO_SETS = [
  { value: 'pooled', label: 'Are pooled: their mean counts' },
  { value: 'each', label: 'Each stands by itself: a breach needs both' },
];

export const LimitFields = ({ value, onChange }: Props<LimitRequirement>) => {
  const { dimension } = getQuantityEntry(value.quantity);
  const { nominal, unit } = value;
  const none = { text: '', unit };
  const shared = { dimension, unit };
  const { min, max, nominal: _nominal, ...unbound } = value;
  return (
    <>
      <Group at="/requirement/measurand" label="What is measured">
        <MeasurandFields value={value} onChange={onChange} />
      </Group>
      <Group at="/requirement" label="The limit">
        <SelectField
          at="/requirement/bounds"
          label="Stated as"
          value={nominal === undefined ? 'bounds' : 'nominal'}
          options={BOUNDS}
          onChange={(way) =>
            onChange(
              way === 'nominal'
                ? { ...unbound, nominal: { size: min ?? max ?? none, plus: none, minus: none } }
                : { ...unbound, max: nominal?.size },
            )
          }
        />
        {nominal === undefined ? (
          <>
            <WrittenField
              {...shared}
              at="/requirement/min"
              label="At least"
              value={min}
              onChange={(next) => onChange({ ...value, min: next })}
            />
            <WrittenField
              {...shared}
              at="/requirement/max"
              label="At most"
              value={max}
              onChange={(next) => onChange({ ...value, max: next })}
            />
          </>
        ) : (
          (['size', 'plus', 'minus'] as const).map((part) => (
            <WrittenField
              {...shared}
              key={part}
              at={`/requirement/nominal/${part}`}
              label={{ size: 'Nominal', plus: 'Over, at most', minus: 'Under, at most' }[part]}
              value={nominal[part]}
              onChange={(next) =>
                onChange({ ...value, nominal: { ...nominal, [part]: next ?? none } })
              }
            />
          ))
        )}
        <SelectField
          at="/requirement/sample"
          label="Checked on"
          value={value.sample.kind}
          options={[
            { value: 'all', label: `Every ${value.per}` },
            { value: 'some', label: 'A stated sample' },
          ]}
          onChange={(kind) =>
            onChange({ ...value, sample: kind === 'some' ? { kind, count: 1 } : { kind: 'all' } })
          }
        />
        {value.sample.kind === 'some' && (
          <WholeField
            at="/requirement/sample/count"
            label="How many"
            value={value.sample.count}
            onChange={(count) => onChange({ ...value, sample: { kind: 'some', count } })}
          />
        )}
        <RoundingFields value={value} onChange={onChange} />
      </Group>
      <Group at="/requirement/held" label="How it is decided">
        <HeldFields value={value} onChange={onChange} />
        {value.per !== 'car' && (
          <SelectField
            at="/requirement/twoSets"
            label="Two sets of one place"
            value={value.twoSets ?? 'pooled'}
            options={TWO_SETS}
            onChange={(way) => onChange({ ...value, twoSets: way === 'each' ? way : undefined })}
          />
        )}
      </Group>
    </>
  );
};

export const ReferenceFields = ({ value, onChange }: Props<ReferenceAverageRequirement>) => {
  const { dimension } = getQuantityEntry(value.quantity);
  return (
    <>
      <Group at="/requirement/measurand" label="What is measured">
        <MeasurandFields value={value} onChange={onChange} />
      </Group>
      <Group at="/requirement" label="Against the mean of reference parts">
        <WholeField
          at="/requirement/n"
          label="At least how many parts"
          value={value.n}
          onChange={(n) => onChange({ ...value, n })}
        />
        {(['plus', 'minus'] as const).map((part) => (
          <WrittenField
            key={part}
            at={`/requirement/${part}`}
            label={part === 'plus' ? 'Over, at most' : 'Under, at most'}
            dimension={dimension}
            unit={value.unit}
            value={value[part]}
            onChange={(next) =>
              onChange({ ...value, [part]: next ?? { text: '', unit: value.unit } })
            }
          />
        ))}
      </Group>
      <Group at="/requirement/held" label="How it is decided">
        <HeldFields value={value} onChange={onChange} />
      </Group>
    </>
  );
};
