import { useState } from 'react';
import { answerFault } from '@/domain/paperwork/declare';
import { findTyped, type PaperworkDraft, withAnswer } from '@/domain/paperwork/draft';
import type { ItemRemark } from '@/domain/paperwork/state';
import type { Question } from '@/domain/rulebook/form/form';
import { answerWords } from './answer-words';
import { QuestionField } from './QuestionField';
import { RemarksOn } from './RemarksOn';

interface QuestionsProps {
  readonly questions: readonly Question[];
  readonly draft: PaperworkDraft;
  readonly remarks: readonly ItemRemark[];
  readonly onChange: (make: (before: PaperworkDraft) => PaperworkDraft) => void;
}

/** The questions in the rulebook's order: answered ones in a line each, the others open. */
export const Questions = ({ questions, draft, remarks, onChange }: QuestionsProps) => {
  const answerOf = (question: Question) =>
    findTyped(draft, question.subject, question.per === 'car' ? 'car' : 'engine');
  const isAnswered = (question: Question) => {
    const answer = answerOf(question);
    return answer !== undefined && answerFault(question, answer) === undefined;
  };
  // Those open when the page was opened stay open while they are answered.
  const [open, setOpen] = useState<readonly string[]>(() =>
    questions.filter((question) => !isAnswered(question)).map((question) => question.subject),
  );
  return (
    <section aria-labelledby="questions">
      <div className="section-head ruled">
        <h2 id="questions">Questions</h2>
        <span className="text-ink-2">
          {questions.filter(isAnswered).length} of {questions.length} answered
        </span>
      </div>
      <ol>
        {questions.map((question, at) => {
          const answer = answerOf(question);
          return (
            <li className="border-b border-hair" key={question.subject}>
              {open.includes(question.subject) ? (
                <QuestionField
                  question={question}
                  answer={answer}
                  onChange={(next) => onChange((before) => withAnswer(before, next))}
                />
              ) : (
                <div className="flex min-h-12 flex-wrap items-center gap-x-3">
                  <span className="num text-ink-2">{at + 1}</span>
                  <span className="min-w-0 flex-1 basis-28">{question.question}</span>
                  <strong className="break-words">
                    {answerWords(question, answer?.typed ?? '', answer?.unit)}
                  </strong>
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
