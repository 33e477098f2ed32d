import { positionsIn } from '../inspection/found-facts';
import { derivedNumbers } from '../inspection/measure/derived-numbers';
import { fromStored } from '../quantity/stored';
import type { AnswerFact, Facts, NumberFact } from '../rulebook/evaluate/facts';
import { getQuantityEntry, isQuantityName } from '../rulebook/quantity-catalogue';
import type { RulesInForce } from '../rulebook/rules-in-force';
import type { BoreLayout } from '../tappet/layout/bore-layout';
import { lobeOf } from './cam/cam-place';
import { lobeFacts } from './cam/lobe-facts';
import type { DeclaredAnswer, PaperworkDocument } from './document';
import { numbersFrom } from './sheet-numbers';

/** What is declared so far, whether handed in or still a draft. */
export interface Declared
  extends Pick<PaperworkDocument, 'answers' | 'sheets' | 'photographs' | 'files'> {
  readonly engine: { readonly layout: BoreLayout };
}

/** A declared value states no uncertainty of its own. */
const answeredNumber = (answer: DeclaredAnswer): readonly NumberFact[] =>
  'written' in answer && isQuantityName(answer.subject)
    ? [
        {
          quantity: answer.subject,
          position: answer.position,
          value: fromStored(answer.written, getQuantityEntry(answer.subject).dimension),
          standardUncertainty: 0,
        },
      ]
    : [];

const answered = (answer: DeclaredAnswer): readonly AnswerFact[] =>
  'value' in answer
    ? [{ subject: answer.subject, position: answer.position, answer: answer.value }]
    : [];

/**
 * A declaration as the rules evaluate it, and as an inspection compares with it (`Facts.declared`).
 * Throws on a number that was never one: what is handed in has been read before. The rules say at which
 * lift a cam table gives a duration.
 */
export const declaredFacts = (
  paperwork: Declared,
  rules?: Pick<RulesInForce, 'clauses'>,
): Facts => {
  const { layout } = paperwork.engine;
  const positions = positionsIn(layout);
  const readings = paperwork.sheets.flatMap((sheet) => sheet.readings);
  const written = [
    ...paperwork.answers.flatMap(answeredNumber),
    ...numbersFrom(readings.filter((reading) => lobeOf(reading) === undefined)),
  ];
  const numbers = [...written, ...lobeFacts(readings, layout, written, rules)];
  return {
    origin: 'declared',
    positions,
    numbers: [...numbers, ...derivedNumbers(numbers, positions)],
    answers: paperwork.answers.flatMap(answered),
    evidence: [
      ...new Set([
        ...paperwork.photographs.map((file) => file.item),
        ...paperwork.files.map((file) => file.item),
        ...paperwork.sheets
          .filter((sheet) => sheet.readings.length > 0)
          .map((sheet) => sheet.subject),
      ]),
    ],
    couldNotBeReached: [],
    references: [],
  };
};
