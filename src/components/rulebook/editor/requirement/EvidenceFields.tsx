import type {
  PhotographRequirement,
  PlugGaugeRequirement,
  SealRequirement,
  SheetKind,
  SheetRequirement,
} from '@/domain/rulebook/requirement';
import { Group } from '../fields/faults';
import { SelectField } from '../fields/SelectField';
import { TextField, WholeField } from '../fields/TextField';
import { WrittenField } from '../fields/WrittenField';
import { PerField, SubjectField } from './AnswerFields';

interface Props<R> {
  readonly value: R;
  readonly onChange: (value: R) => void;
}

export const PlugGaugeFields = ({ value, onChange }: Props<PlugGaugeRequirement>) => (
  <Group at="/requirement" label="The gauge" hint="Offered by hand, never forced">
    <SelectField
      at="/requirement/gauge"
      label="It"
      value={value.gauge}
      options={[
        { value: 'go', label: 'must pass (go)' },
        { value: 'no-go', label: 'must not pass (no-go)' },
      ]}
      onChange={(gauge) => onChange({ ...value, gauge: gauge === 'go' ? 'go' : 'no-go' })}
    />
    <WrittenField
      at="/requirement/size"
      label="Size"
      dimension="length"
      unit={value.size.unit}
      value={value.size}
      onChange={(size) => onChange({ ...value, size: size ?? { text: '', unit: value.size.unit } })}
    />
    <TextField
      at="/requirement/where"
      label="Where it is offered"
      value={value.where}
      onChange={(where) => onChange({ ...value, where })}
    />
    <PerField value={value.per} onChange={(per) => onChange({ ...value, per })} />
    <SubjectField
      value={value.subject}
      from={`${value.where} gauge`}
      onChange={(subject) => onChange({ ...value, subject })}
    />
  </Group>
);

export const PhotographFields = ({ value, onChange }: Props<PhotographRequirement>) => (
  <Group at="/requirement" label="The photograph">
    <TextField
      at="/requirement/visible"
      label="What must be visible"
      hint="One thing a line"
      long
      value={value.visible.join('\n')}
      onChange={(text) =>
        onChange({ ...value, visible: text === '' ? [] : text.split('\n').slice(0, 20) })
      }
    />
    <SubjectField
      value={value.subject}
      from={value.visible[0] ?? ''}
      onChange={(subject) => onChange({ ...value, subject })}
    />
  </Group>
);

const SHEETS = [
  { value: 'lifters', label: 'Lifter sheet' },
  { value: 'engine', label: 'Build sheet' },
  { value: 'camshaft', label: 'Cam card' },
  { value: 'lift-table', label: 'Cam table, lift by degree' },
  { value: 'weights', label: 'Weights' },
  { value: 'other', label: 'Another sheet' },
];

export const SheetFields = ({ value, onChange }: Props<SheetRequirement>) => (
  <Group at="/requirement" label="The sheet">
    <SelectField
      at="/requirement/sheet"
      label="Which sheet"
      value={value.sheet}
      options={SHEETS}
      onChange={(sheet) => onChange({ ...value, sheet: sheet as SheetKind })}
    />
    <TextField
      at="/requirement/title"
      label="Its name"
      value={value.title}
      onChange={(title) => onChange({ ...value, title })}
    />
    <SubjectField
      value={value.subject}
      from={value.title}
      onChange={(subject) => onChange({ ...value, subject })}
    />
  </Group>
);

export const SealFields = ({ value, onChange }: Props<SealRequirement>) => (
  <Group at="/requirement" label="The seals">
    <TextField
      at="/requirement/place"
      label="Where they sit"
      value={value.place}
      onChange={(place) => onChange({ ...value, place })}
    />
    <WholeField
      at="/requirement/count"
      label="How many"
      value={value.count}
      onChange={(count) => onChange({ ...value, count })}
    />
    <SubjectField
      value={value.subject}
      from={`${value.place} seal`}
      onChange={(subject) => onChange({ ...value, subject })}
    />
  </Group>
);
