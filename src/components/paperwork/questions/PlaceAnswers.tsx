import { useState } from 'react';
import { placeAnswers, placesOf } from '@/domain/paperwork/answers';
import { answerFault } from '@/domain/paperwork/declare';
import { type DraftAnswer, findTyped, type PaperworkDraft } from '@/domain/paperwork/draft';
import type { Question } from '@/domain/rulebook/form/form';
import type { BoreLayout } from '@/domain/tappet/layout/bore-layout';
import { AnswerInput } from './AnswerInput';

interface PlaceAnswersProps {
  readonly question: Question;
  readonly layout: BoreLayout;
  readonly draft: PaperworkDraft;
  readonly onChange: (answer: DraftAnswer) => void;
}

/** Single bores or cylinders that differ from the rest; nothing for a question that asks once. */
export const PlaceAnswers = ({ question, layout, draft, onChange }: PlaceAnswersProps) => {
  const places = placesOf(question, layout);
  const own = placeAnswers(draft, question, layout);
  // A place that was added and has no answer yet is in no draft.
  const [added, setAdded] = useState<readonly string[]>([]);
  if (places.length === 0) return null;
  const { subject } = question;
  const shown = places.filter(
    ({ key }) => added.includes(key) || own.some(({ position }) => position === key),
  );
  const kind = question.per === 'cylinder' ? 'cylinder' : 'bore';
  const say = (position: string, typed: string) => onChange({ subject, position, typed });
  return (
    <details className="pb-3" open={own.length > 0}>
      <summary className="btn-link inline-flex min-h-12 items-center">
        {own.length === 0
          ? `Not the same at every ${kind}?`
          : `Not the same at ${own.length} of ${places.length}`}
      </summary>
      <ul>
        {shown.map(({ key }) => {
          const answer = findTyped(draft, subject, key);
          const fault = answer && answerFault(question, answer);
          return (
            <li className="flex flex-wrap items-center gap-3 py-2" key={key}>
              <span className="min-w-28">{key}</span>
              <AnswerInput
                question={question}
                typed={answer?.typed ?? ''}
                label={`${question.question} ${key}`}
                fault={fault}
                onChange={(typed) => {
                  setAdded([...added, key]);
                  say(key, typed);
                }}
              />
              <button
                type="button"
                className="btn-link"
                onClick={() => {
                  setAdded(added.filter((one) => one !== key));
                  say(key, '');
                }}
              >
                As the rest<span className="visually-hidden">: {key}</span>
              </button>
            </li>
          );
        })}
      </ul>
      <label className="block">
        Another {kind}{' '}
        <select
          className="input"
          value=""
          onChange={(event) => setAdded([...added, event.target.value])}
        >
          <option value="">choose the {kind}</option>
          {places
            .filter((place) => !shown.includes(place))
            .map(({ key }) => (
              <option key={key} value={key}>
                {key}
              </option>
            ))}
        </select>
      </label>
    </details>
  );
};
