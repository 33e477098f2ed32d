import type { Written } from '../quantity/dimension';
import type { LimitRequirement, ReferenceAverageRequirement } from './limit';
import type { Per } from './quantities/entry';

export interface Option {
  /** A lasting key, `hydraulic-flat`. */
  readonly value: string;
  readonly label: string;
}

/** A listed choice: the answer must be one of `allowed`. */
export interface ChoiceRequirement {
  readonly kind: 'choice';
  /** A lasting key that ties declaration and finding, `tappet-type`. */
  readonly subject: string;
  readonly question: string;
  readonly options: readonly Option[];
  /** Values out of `options`. */
  readonly allowed: readonly string[];
  readonly per: Per;
}

export interface YesNoRequirement {
  readonly kind: 'yes-no';
  readonly subject: string;
  readonly question: string;
  /** The answer that complies. */
  readonly required: 'yes' | 'no';
  readonly per: Per;
}

/** What is found must be what was declared, for a subject or a quantity that another clause asks. */
export interface MatchesPaperworkRequirement {
  readonly kind: 'matches-paperwork';
  readonly subject: string;
  readonly question: string;
  readonly per: Per;
}

/** A go / no-go gauge of a stated size, offered by hand and never forced. */
export interface PlugGaugeRequirement {
  readonly kind: 'plug-gauge';
  readonly subject: string;
  readonly size: Written;
  /** `go` must pass, `no-go` must not. */
  readonly gauge: 'go' | 'no-go';
  readonly where: string;
  readonly per: Per;
}

export interface PhotographRequirement {
  readonly kind: 'photograph';
  readonly subject: string;
  /** What must be visible, each a few words. */
  readonly visible: readonly string[];
}

/** A `lift-table` gives the lift of each lobe by degree of crankshaft angle. */
export type SheetKind = 'lifters' | 'engine' | 'camshaft' | 'lift-table' | 'weights' | 'other';

export interface SheetRequirement {
  readonly kind: 'sheet';
  readonly subject: string;
  readonly sheet: SheetKind;
  readonly title: string;
}

export interface SealRequirement {
  readonly kind: 'seal';
  readonly subject: string;
  readonly place: string;
  readonly count: number;
}

/** The part of a clause that can be checked. */
export type Requirement =
  | LimitRequirement
  | ChoiceRequirement
  | YesNoRequirement
  | MatchesPaperworkRequirement
  | PlugGaugeRequirement
  | ReferenceAverageRequirement
  | PhotographRequirement
  | SheetRequirement
  | SealRequirement;

export type RequirementKind = Requirement['kind'];
