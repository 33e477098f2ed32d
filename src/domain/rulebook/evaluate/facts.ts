import type { UncertaintyComponent } from '../../measurement/uncertainty';
import type { Quantity } from '../../quantity/quantity';
import type { Figure } from '../limit';
import type { Per, RuleDimension } from '../quantities/entry';
import type { QuantityName } from '../quantity-catalogue';

/** A number as one independent set gave it. */
export interface SetNumber {
  readonly set: number;
  readonly value: Quantity<RuleDimension>;
  readonly standardUncertainty: number;
  readonly degreesOfFreedom?: number | null | undefined;
  readonly budget?: readonly UncertaintyComponent[] | undefined;
}

/** One number, declared or measured, at one position. */
export interface NumberFact {
  readonly quantity: QuantityName;
  readonly position: string;
  /** Which figure this is; absent for a single value, which then serves as any figure. */
  readonly figure?: Figure | undefined;
  readonly value: Quantity<RuleDimension>;
  /** In the base of the dimension; 0 for a declared value, which states none. */
  readonly standardUncertainty: number;
  readonly degreesOfFreedom?: number | null | undefined;
  /** Whose uncertainty is that of usual gauges, not of a known one: whether it is fit is not asked. */
  readonly assumedGauge?: boolean | undefined;
  /** What the standard uncertainty is made of, where that is known. */
  readonly budget?: readonly UncertaintyComponent[] | undefined;
  /** What each of two or more independent sets gave by itself; `value` is then pooled, or one of them. */
  readonly sets?: readonly SetNumber[] | undefined;
  /** Why nothing can be stated from this value, neither way: `the gauge’s error is not known`. */
  readonly noStatement?: string | undefined;
  /** Why this value cannot support a breach, `the gauge was overdue for calibration`. */
  readonly cannotSupportBreach?: string | undefined;
  /** A check that makes up for it where the clause allows as much as it was off. */
  readonly liftedBy?: { readonly off: Quantity<'length'>; readonly words: string } | undefined;
  /** Checks of the gauge that night, in words: `gauge DB-07 checked on the ring SR-03 at 21:10 …`. */
  readonly checked?: readonly string[] | undefined;
}

/** A choice's key, `yes` / `no`, or text, at one position. */
export interface AnswerFact {
  readonly subject: string;
  readonly position: string;
  readonly answer: string;
}

/** A position that was tried and gave nothing. */
export interface GapFact {
  readonly position: string;
  /** One quantity or subject; absent for all of the position. */
  readonly subject?: string | undefined;
}

/** A part of a known reference set, measured like the part in question. */
export interface ReferenceFact {
  readonly quantity: QuantityName;
  readonly part: string;
  readonly value: Quantity<RuleDimension>;
  readonly standardUncertainty: number;
}

export interface Position {
  readonly key: string;
  /** `Bore 3 intake`. */
  readonly label: string;
}

/** The positions that an engine has, from its position map. */
export interface Positions {
  readonly bores: readonly Position[];
  readonly cylinders: readonly Position[];
}

/** What is held against the rules: a declaration, or what an inspection found. */
export interface Facts {
  readonly origin: 'declared' | 'found';
  readonly positions: Positions;
  readonly numbers: readonly NumberFact[];
  readonly answers: readonly AnswerFact[];
  /** Subjects of photographs and sheets that were handed in. */
  readonly evidence: readonly string[];
  readonly couldNotBeReached: readonly GapFact[];
  readonly references: readonly ReferenceFact[];
  /** For findings: the accepted declaration they are compared with. */
  readonly declared?: Facts | undefined;
}

const WHOLE: Readonly<Record<'engine' | 'car', readonly Position[]>> = {
  engine: [{ key: 'engine', label: 'Engine' }],
  car: [{ key: 'car', label: 'Car' }],
};

export const positionsFor = (per: Per, positions: Positions): readonly Position[] => {
  if (per === 'bore' || per === 'lifter') return positions.bores;
  return per === 'cylinder' ? positions.cylinders : WHOLE[per];
};

export const findNumber = (
  facts: Pick<Facts, 'numbers'>,
  quantity: QuantityName,
  position: string,
  figure: Figure | undefined,
): NumberFact | undefined => {
  const here = facts.numbers.filter(
    (fact) => fact.quantity === quantity && fact.position === position,
  );
  return (
    here.find((fact) => fact.figure === figure) ??
    here.find((fact) => fact.figure === undefined || figure === undefined)
  );
};

export const findAnswer = (facts: Facts, subject: string, position: string): string | undefined =>
  facts.answers.find((fact) => fact.subject === subject && fact.position === position)?.answer;

export const wasOutOfReach = (facts: Facts, subject: string, position: string): boolean =>
  facts.couldNotBeReached.some(
    (gap) => gap.position === position && (gap.subject === undefined || gap.subject === subject),
  );
