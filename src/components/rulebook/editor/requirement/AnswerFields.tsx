import type { Per } from '@/domain/rulebook/quantities/entry';
import type {
  ChoiceRequirement,
  MatchesPaperworkRequirement,
  YesNoRequirement,
} from '@/domain/rulebook/requirement';
import { Group } from '../fields/faults';
import { RowsField } from '../fields/RowsField';
import { CheckField, SelectField } from '../fields/SelectField';
import { TextField } from '../fields/TextField';

const PARTS = [
  { value: 'engine', label: 'the engine' },
  { value: 'car', label: 'the car' },
  { value: 'cylinder', label: 'each cylinder' },
  { value: 'bore', label: 'each bore' },
  { value: 'lifter', label: 'each lifter' },
];

export const PerField = ({
  value,
  onChange,
}: {
  readonly value: Per;
  readonly onChange: (per: Per) => void;
}) => (
  <SelectField
    at="/requirement/per"
    label="Once for"
    value={value}
    options={PARTS}
    onChange={(per) => onChange(per as Per)}
  />
);

/** `Which type are the tappets?` as `which-type-are-the-tappets`: a key to begin with. */
export const keyFrom = (words: string): string =>
  words
    .toLowerCase()
    .replace(/[^a-z0-9]+/g, '-')
    .replace(/^[-0-9]+|-+$/g, '')
    .slice(0, 60);

export const SubjectField = ({
  value,
  from,
  onChange,
}: {
  readonly value: string;
  /** Words that a key is offered from. */
  readonly from: string;
  readonly onChange: (subject: string) => void;
}) => (
  <>
    <TextField
      at="/requirement/subject"
      label="Key"
      hint="Ties paperwork and finding together, such as tappet-type; clauses with one key ask once"
      value={value}
      maxLength={60}
      onChange={onChange}
    />
    {value === '' && keyFrom(from) !== '' && (
      <button type="button" className="btn" onClick={() => onChange(keyFrom(from))}>
        Take {keyFrom(from)}
      </button>
    )}
  </>
);

type Answered = ChoiceRequirement | YesNoRequirement | MatchesPaperworkRequirement;

interface AnswerFieldsProps {
  readonly value: Answered;
  readonly onChange: (value: Answered) => void;
}

/** A question that is asked on the paperwork and answered again in the bay. */
export const AnswerFields = ({ value, onChange }: AnswerFieldsProps) => (
  <Group at="/requirement" label="The question">
    <TextField
      at="/requirement/question"
      label="Question, as it stands on the form"
      value={value.question}
      onChange={(question) => onChange({ ...value, question })}
    />
    <SubjectField
      value={value.subject}
      from={value.question}
      onChange={(subject) => onChange({ ...value, subject })}
    />
    <PerField value={value.per} onChange={(per) => onChange({ ...value, per })} />
    {value.kind === 'yes-no' && (
      <SelectField
        at="/requirement/required"
        label="The answer that complies"
        value={value.required}
        options={[
          { value: 'yes', label: 'Yes' },
          { value: 'no', label: 'No' },
        ]}
        onChange={(required) => onChange({ ...value, required: required === 'no' ? 'no' : 'yes' })}
      />
    )}
    {value.kind === 'choice' && <Options value={value} onChange={onChange} />}
  </Group>
);

const Options = ({
  value,
  onChange,
}: {
  readonly value: ChoiceRequirement;
  readonly onChange: (value: ChoiceRequirement) => void;
}) => (
  <>
    <Group at="/requirement/options" label="Options">
      <RowsField
        rows={value.options}
        one="option"
        fresh={{ value: '', label: '' }}
        onChange={(options) => {
          const keys = options.map((option) => option.value);
          onChange({
            ...value,
            options,
            allowed: value.allowed.filter((key) => keys.includes(key)),
          });
        }}
        show={(option, change, index) => (
          <>
            <TextField
              at={`/requirement/options/${index}/label`}
              label={`Option ${index + 1}`}
              value={option.label}
              onChange={(label) =>
                change({
                  label,
                  value: option.value === keyFrom(option.label) ? keyFrom(label) : option.value,
                })
              }
            />
            <TextField
              at={`/requirement/options/${index}/value`}
              label="Key"
              value={option.value}
              maxLength={60}
              onChange={(key) => change({ ...option, value: key })}
            />
          </>
        )}
      />
    </Group>
    <Group at="/requirement/allowed" label="Allowed">
      {value.options.map((option) => (
        <CheckField
          key={option.value}
          label={option.label || option.value}
          checked={value.allowed.includes(option.value)}
          onChange={(allowed) =>
            onChange({
              ...value,
              allowed: allowed
                ? [...value.allowed, option.value]
                : value.allowed.filter((key) => key !== option.value),
            })
          }
        />
      ))}
    </Group>
  </>
);
