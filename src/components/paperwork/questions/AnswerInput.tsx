import type { Question } from '@/domain/rulebook/form/form';

const YES_NO = [
  { value: 'yes', label: 'Yes' },
  { value: 'no', label: 'No' },
] as const;

interface AnswerInputProps {
  readonly question: Question;
  readonly typed: string;
  readonly label: string;
  readonly fault: string | undefined;
  readonly onChange: (typed: string) => void;
}

/** One answer in a single line: a list to choose from, or what is typed. */
export const AnswerInput = ({ question, typed, label, fault, onChange }: AnswerInputProps) => {
  if (question.kind === 'choice' || question.kind === 'yes-no')
    return (
      <select
        className="input"
        aria-label={label}
        value={typed}
        onChange={(event) => onChange(event.target.value)}
      >
        <option value="">choose</option>
        {(question.kind === 'choice' ? question.options : YES_NO).map((option) => (
          <option key={option.value} value={option.value}>
            {option.label}
          </option>
        ))}
      </select>
    );
  const isNumber = question.kind === 'number';
  return (
    <span className="min-w-0">
      <input
        className={`input ${isNumber ? 'input-num' : ''}`}
        inputMode={isNumber ? 'decimal' : undefined}
        autoComplete="off"
        maxLength={200}
        aria-label={label}
        aria-invalid={fault === undefined ? undefined : true}
        value={typed}
        onChange={(event) => onChange(event.target.value)}
      />
      {fault !== undefined && <span className="field-error">{fault} Kept as written.</span>}
    </span>
  );
};
