import { parseQuantity } from '../quantity/parse';
import type { PaperworkForm, Question } from '../rulebook/form/form';
import { getQuantityEntry } from '../rulebook/quantity-catalogue';
import type { BoreLayout } from '../tappet/layout/bore-layout';
import type { Declared } from './declared-facts';
import type { DeclaredAnswer, DeclaredFile, DeclaredReading, DeclaredSheet } from './document';
import type { DraftAnswer, PaperworkDraft } from './draft';
import { judgeCells } from './sheet/judge-cells';

/** A file that counts, and whether it is a photograph or a paper. */
export interface PaperworkFile extends DeclaredFile {
  readonly purpose: 'photograph' | 'sheet';
}

/** What is wrong with an answer as it was typed; nothing where it can be taken. */
export const answerFault = (question: Question, answer: DraftAnswer): string | undefined => {
  if (question.kind === 'choice')
    return question.options.some((option) => option.value === answer.typed)
      ? undefined
      : 'Choose one of the listed answers.';
  if (question.kind === 'yes-no')
    return answer.typed === 'yes' || answer.typed === 'no' ? undefined : 'Answer yes or no.';
  if (question.kind === 'text') return undefined;
  const read = numberOf(question, answer);
  return read.ok ? undefined : read.failure.detail;
};

const numberOf = (question: Extract<Question, { kind: 'number' }>, answer: DraftAnswer) =>
  parseQuantity(answer.typed, {
    dimension: getQuantityEntry(question.quantity).dimension,
    defaultUnit: answer.unit ?? question.unit,
  });

const declaredAnswer = (question: Question, answer: DraftAnswer): readonly DeclaredAnswer[] => {
  const { subject, position } = answer;
  const typed = answer.typed.trim();
  if (typed === '' || answerFault(question, answer) !== undefined) return [];
  if (question.kind !== 'number') return [{ subject, position, value: typed }];
  const read = numberOf(question, answer);
  return read.ok
    ? [{ subject, position, written: { text: read.value.text, unit: read.value.unit } }]
    : [];
};

/** Numbers that stand; what is faulty or still in question is not declared yet. */
const declaredSheet = (sheet: PaperworkDraft['sheets'][number]): DeclaredSheet => ({
  subject: sheet.subject,
  readings: judgeCells(sheet.cells).flatMap(({ cell, state, quantity }): DeclaredReading[] => {
    if (state !== 'ok' || quantity === undefined) return [];
    const { position, depth, axis, source } = cell;
    return [
      {
        position,
        quantity: cell.quantity,
        depth,
        axis,
        value: { text: quantity.text, unit: quantity.unit },
        ...(source === undefined ? {} : { source }),
      },
    ];
  }),
});

const withoutPurpose = ({ purpose: _purpose, ...file }: PaperworkFile): DeclaredFile => file;

/** What of the draft can be declared: answers to questions that the rules ask, and readable numbers. */
export const declare = (
  draft: PaperworkDraft,
  form: PaperworkForm,
  layout: BoreLayout,
  files: readonly PaperworkFile[],
): Declared => ({
  engine: { layout },
  answers: form.questions.flatMap((question) =>
    draft.answers
      .filter((answer) => answer.subject === question.subject)
      .flatMap((answer) => declaredAnswer(question, answer)),
  ),
  sheets: form.sheets.flatMap((asked) =>
    draft.sheets.filter((sheet) => sheet.subject === asked.subject).map(declaredSheet),
  ),
  photographs: files.filter((file) => file.purpose === 'photograph').map(withoutPurpose),
  files: files.filter((file) => file.purpose === 'sheet').map(withoutPurpose),
});
