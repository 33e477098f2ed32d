import { type Failure, type Fault, invalid } from '../../failure';
import type { Written } from '../../quantity/dimension';
import { parseQuantity } from '../../quantity/parse';
import { minus } from '../../quantity/quantity';
import { fail, ok, type Result } from '../../result';
import { getQuantityEntry, type QuantityName } from '../quantity-catalogue';
import { type AnswerFact, type Facts, findNumber, type NumberFact, type Positions } from './facts';

/** A number as declared: typed on the form or read from a sheet; a blank text declares nothing. */
export interface DeclaredNumber {
  readonly quantity: QuantityName;
  readonly position: string;
  readonly value: Written;
}

export interface Declaration {
  readonly positions: Positions;
  readonly answers: readonly AnswerFact[];
  readonly numbers: readonly DeclaredNumber[];
  /** Subjects of photographs and sheets that are attached. */
  readonly evidence: readonly string[];
}

/** Worked out where both parts are declared and it is not itself: first less second. */
const DIFFERENCES: readonly (readonly [QuantityName, QuantityName, QuantityName])[] = [
  ['foot-less-body', 'foot-diameter', 'lifter-body-diameter'],
  ['tappet-clearance', 'tappet-bore-diameter', 'lifter-body-diameter'],
];

const derived = (numbers: readonly NumberFact[], positions: Positions): readonly NumberFact[] =>
  positions.bores.flatMap(({ key }) =>
    DIFFERENCES.flatMap(([quantity, larger, smaller]): readonly NumberFact[] => {
      const find = (name: QuantityName) => findNumber({ numbers }, name, key, undefined);
      const whole = find(larger);
      const part = find(smaller);
      if (whole === undefined || part === undefined || find(quantity) !== undefined) return [];
      const value = minus(whole.value, part.value);
      return [{ quantity, position: key, value, standardUncertainty: 0 }];
    }),
  );

/**
 * A declaration as facts to hold against the rules; clearance and foot less body are worked out.
 * Declared values state no uncertainty. Every number that cannot be read is named by its place.
 */
export const declaredFacts = (declaration: Declaration): Result<Facts, Failure> => {
  const faults: Fault[] = [];
  const numbers = declaration.numbers.flatMap((declared, i): readonly NumberFact[] => {
    const { quantity, position, value } = declared;
    if (value.text.trim() === '') return [];
    const { dimension, unit } = getQuantityEntry(quantity);
    const text = value.unit === '' ? value.text : `${value.text} ${value.unit}`;
    const read = parseQuantity(text, { dimension, defaultUnit: unit });
    if (read.ok) return [{ quantity, position, value: read.value, standardUncertainty: 0 }];
    faults.push({ pointer: `/numbers/${i}/value`, detail: read.failure.detail });
    return [];
  });
  if (faults.length > 0) return fail(invalid(faults));
  return ok({
    origin: 'declared',
    positions: declaration.positions,
    numbers: [...numbers, ...derived(numbers, declaration.positions)],
    answers: declaration.answers.filter((row) => row.answer.trim() !== ''),
    evidence: declaration.evidence,
    couldNotBeReached: [],
    references: [],
  });
};
