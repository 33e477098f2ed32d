import type { Position } from '../rulebook/evaluate/facts';
import type { Question } from '../rulebook/form/form';
import type { BoreLayout } from '../tappet/layout/bore-layout';
import { answerFault } from './declare';
import { type DraftAnswer, findTyped, type PaperworkDraft } from './draft';
import { rowsFor } from './sheet/positions';

/** The place of an answer that holds for the whole. */
export const wholePlace = ({ per }: Pick<Question, 'per'>): 'car' | 'engine' =>
  per === 'car' ? 'car' : 'engine';

/** The places that may differ from the whole: bores, or cylinders; none where the question asks once. */
export const placesOf = (
  { per }: Pick<Question, 'per'>,
  layout: BoreLayout,
): readonly Position[] => (per === 'engine' || per === 'car' ? [] : rowsFor(per, layout));

/** Answers for single places, in the order of the places. */
export const placeAnswers = (
  draft: PaperworkDraft,
  question: Question,
  layout: BoreLayout,
): readonly DraftAnswer[] =>
  placesOf(question, layout).flatMap(({ key }) => findTyped(draft, question.subject, key) ?? []);

/** Whether there is an answer for the whole, or one for every place, and none that cannot be read. */
export const isAnswered = (
  draft: PaperworkDraft,
  question: Question,
  layout: BoreLayout,
): boolean => {
  const own = placeAnswers(draft, question, layout);
  if (own.some((answer) => answerFault(question, answer) !== undefined)) return false;
  const whole = findTyped(draft, question.subject, wholePlace(question));
  if (whole !== undefined) return answerFault(question, whole) === undefined;
  const places = placesOf(question, layout);
  return places.length > 0 && own.length === places.length;
};
