import { useState } from 'react';
import { isAnswered, placeAnswers, wholePlace } from '@/domain/paperwork/answers';
import { findTyped, type PaperworkDraft, withAnswer } from '@/domain/paperwork/draft';
import type { ItemRemark } from '@/domain/paperwork/state';
import type { Question } from '@/domain/rulebook/form/form';
import type { BoreLayout } from '@/domain/tappet/layout/bore-layout';
import { RemarksOn } from '../remarks/RemarksOn';
import { answerWords } from './answer-words';
import { PlaceAnswers } from './PlaceAnswers';
import { QuestionField } from './QuestionField';

interface QuestionsProps {
  readonly questions: readonly Question[];
  readonly draft: PaperworkDraft;
  readonly layout: BoreLayout;
  readonly remarks: readonly ItemRemark[];
  readonly onChange: (make: (before: PaperworkDraft) => PaperworkDraft) => void;
}

/** The questions in the rulebook's order: answered ones in a line each, the others open. */
export const Questions = ({ questions, draft, layout, remarks, onChange }: QuestionsProps) => {
  const answerOf = (question: Question) => findTyped(draft, question.subject, wholePlace(question));
  const isDone = (question: Question) => isAnswered(draft, question, layout);
  const inWords = (question: Question): string =>
    [answerOf(question), ...placeAnswers(draft, question, layout)]
      .flatMap((answer) => {
        if (answer === undefined) return [];
        const words = answerWords(question, answer.typed, answer.unit);
        return answer.position === wholePlace(question) ? words : `${answer.position}: ${words}`;
      })
      .join('; ');
  // Those open when the page was opened stay open while they are answered.
  const [open, setOpen] = useState<readonly string[]>(() =>
    questions.filter((question) => !isDone(question)).map((question) => question.subject),
  );
  return (
    <section aria-labelledby="questions">
      <div className="section-head ruled">
        <h2 id="questions">Questions</h2>
        <span className="text-ink-2">
          {questions.filter(isDone).length} of {questions.length} answered
        </span>
      </div>
      <ol>
        {questions.map((question, at) => {
          return (
            <li className="border-b border-hair" key={question.subject}>
              {open.includes(question.subject) ? (
                <>
                  <QuestionField
                    question={question}
                    answer={answerOf(question)}
                    onChange={(next) => onChange((before) => withAnswer(before, next))}
                  />
                  <PlaceAnswers
                    question={question}
                    layout={layout}
                    draft={draft}
                    onChange={(next) => onChange((before) => withAnswer(before, next))}
                  />
                </>
              ) : (
                <div className="flex min-h-12 flex-wrap items-center gap-x-3">
                  <span className="num text-ink-2">{at + 1}</span>
                  <span className="min-w-0 flex-1 basis-28">{question.question}</span>
                  <strong className="break-words">{inWords(question)}</strong>
                  <button
                    type="button"
                    className="btn-link"
                    onClick={() => setOpen([...open, question.subject])}
                  >
                    change<span className="visually-hidden"> {question.question}</span>
                  </button>
                </div>
              )}
              <RemarksOn remarks={remarks} item={question.subject} />
            </li>
          );
        })}
      </ol>
    </section>
  );
};
