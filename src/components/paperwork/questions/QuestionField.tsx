import { useId } from 'react';
import { answerFault } from '@/domain/paperwork/declare';
import type { DraftAnswer } from '@/domain/paperwork/draft';
import type { Question } from '@/domain/rulebook/form/form';

interface QuestionFieldProps {
  readonly question: Question;
  readonly answer: DraftAnswer | undefined;
  readonly onChange: (answer: DraftAnswer) => void;
}

const YES_NO = [
  { value: 'yes', label: 'Yes' },
  { value: 'no', label: 'No' },
] as const;

const unitWords = (unit: string): string => (unit === '1' ? '' : ` (${unit})`);

/** One question of the form: a list to choose from, or a line to write on. What is typed stays as typed. */
export const QuestionField = ({ question, answer, onChange }: QuestionFieldProps) => {
  const id = useId();
  const position = question.per === 'car' ? 'car' : 'engine';
  const typed = answer?.typed ?? '';
  const change = (text: string) => onChange({ subject: question.subject, position, typed: text });
  const fault = answer === undefined ? undefined : answerFault(question, answer);
  const rule = (
    <p className="hint">
      Clause <span className="num">{question.clauses.join(', ')}</span>.{' '}
      {question.rule.replace(`${question.question} `, '')}
    </p>
  );
  if (question.kind === 'choice' || question.kind === 'yes-no') {
    const options = question.kind === 'choice' ? question.options : YES_NO;
    return (
      <fieldset className="py-3" id={`answer-${question.subject}`}>
        <legend>{question.question}</legend>
        {rule}
        <div className="flex flex-wrap gap-x-6">
          {options.map((option) => (
            <label className="choice" key={option.value}>
              <input
                type="radio"
                name={id}
                value={option.value}
                checked={typed === option.value}
                onChange={() => change(option.value)}
              />
              {option.label}
            </label>
          ))}
        </div>
      </fieldset>
    );
  }
  const isNumber = question.kind === 'number';
  return (
    <div className="field py-3" id={`answer-${question.subject}`}>
      <label htmlFor={id}>
        {question.question}
        {isNumber && unitWords(question.unit)}
      </label>
      {rule}
      {isNumber && question.datum !== undefined && (
        <p className="hint">Measured {question.datum}.</p>
      )}
      <input
        id={id}
        className={isNumber ? 'input-num' : undefined}
        inputMode={isNumber ? 'decimal' : undefined}
        autoComplete="off"
        maxLength={200}
        value={typed}
        aria-invalid={fault === undefined ? undefined : true}
        aria-describedby={fault === undefined ? undefined : `${id}-fault`}
        onChange={(event) => change(event.target.value)}
      />
      {fault !== undefined && (
        <p className="field-error" id={`${id}-fault`}>
          {fault} Kept as written.
        </p>
      )}
    </div>
  );
};
