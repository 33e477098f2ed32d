import type { Written } from '../../quantity/dimension';
import type { BudgetWords, State } from '../../rulebook/clause-result';

/** A person's decision on an entry. */
export type Decision = 'breach' | 'no-breach';

/** What the signed report adds up to; `none` where a mandatory clause has no statement or was not checked. */
export type ComputedStatement = 'fail' | 'pass' | 'none';

/** A reading behind a breached clause, as it was taken. */
export interface NoticeReading {
  /** Of the quantity, `Lifter foot diameter`. */
  readonly label: string;
  readonly depth: string;
  readonly axis: string;
  readonly value: Written;
}

/** How a measured value lies against its limits; for drawing the gauge strip. */
export interface NoticeLimits {
  readonly min?: Written | undefined;
  readonly max?: Written | undefined;
  readonly guard?:
    | { readonly kind: 'acceptance' | 'rejection'; readonly width: Written }
    | undefined;
}

/** One position at which a breached clause was found not to be kept. */
export interface NoticePosition {
  readonly position: string;
  readonly state: State;
  readonly pass: boolean | null;
  readonly value?: Written | undefined;
  /** Expanded uncertainty; never without `k`. */
  readonly uncertainty?: Written | undefined;
  readonly k?: string | undefined;
  /** What the uncertainty is made of, the largest first; absent where the report keeps none. */
  readonly budget?: readonly BudgetWords[] | undefined;
  readonly answer?: string | undefined;
  readonly sentence: string;
  readonly readings: readonly NoticeReading[];
}

/** A breached clause as it was in force, with what was found against it and nothing else. */
export interface NoticeClause {
  readonly number: string;
  readonly heading: string;
  readonly words: string;
  readonly edition: string;
  readonly bulletin?: string | undefined;
  /** What was measured, `Foot diameter less body diameter`; absent for a check without a number. */
  readonly measured?: string | undefined;
  readonly limit?: string | undefined;
  readonly limits?: NoticeLimits | undefined;
  /** The decision rule with its numbers, in one sentence. */
  readonly decisionRule?: string | undefined;
  readonly positions: readonly NoticePosition[];
}

export interface NoticeGauge {
  readonly code: string;
  readonly kind: string;
  readonly range?: { readonly from: Written; readonly to: Written } | undefined;
  readonly certificate?: string | undefined;
  readonly calibratedOn?: string | undefined;
  readonly dueOn?: string | undefined;
  /** Opening and closing zeros of the runs behind the readings. */
  readonly zeros: readonly { readonly before: Written; readonly after?: Written | undefined }[];
}

export type NoticeRole = 'found' | 'second-reading' | 'witness' | 'decided';

export interface NoticePerson {
  readonly role: NoticeRole;
  readonly name: string;
  /** For print where the name is in a script that the print's fonts lack. */
  readonly latinName?: string | undefined;
  /** `inspector`, `series official`, and what belongs to it: `first set hidden`, `refused to sign`. */
  readonly standing: string;
  readonly at: string;
}

export interface NoticePenalty {
  readonly row: string;
  readonly breach: string;
  /** 1 for the first breach of the row; the last step holds for all later ones. */
  readonly step: string;
  readonly words: string;
  readonly money?: { readonly minor: string; readonly currency: string } | undefined;
}

/**
 * STORED AND SIGNED: the published notice, committed to by its ledger line. Public content only; all
 * numbers are text and absent members are left out. Instants are ISO 8601 in UTC.
 */
export interface NoticeDocument {
  readonly document: 'tagwire/notice';
  readonly version: '1';
  /** `2026-041`. */
  readonly number: string;
  readonly series: { readonly id: string; readonly slug: string; readonly name: string };
  readonly season: string;
  readonly className: string;
  readonly event: {
    readonly number: string;
    readonly slug: string;
    readonly name: string;
    readonly track: string;
    readonly startsAt: string;
    readonly zone: string;
  };
  readonly car: string;
  readonly decision: Decision;
  readonly computed: ComputedStatement;
  readonly againstComputedBecause?: string | undefined;
  readonly reasons: string;
  readonly penalty?: NoticePenalty | undefined;
  /** Empty unless the decision is `breach`. */
  readonly breached: readonly NoticeClause[];
  /** Every mandatory clause that the report makes a statement on. */
  readonly checked: readonly { readonly number: string; readonly heading: string }[];
  readonly gauges: readonly NoticeGauge[];
  readonly people: readonly NoticePerson[];
  readonly publishedAt: string;
  readonly provisionalUntil: string;
  readonly appeal: {
    readonly until: string;
    readonly address: string;
    readonly bond: { readonly minor: string; readonly currency: string };
  };
  readonly rules: {
    readonly hash: string;
    readonly edition: string;
    readonly bulletins: readonly string[];
  };
  readonly report: { readonly revision: string; readonly hash: string; readonly signedAt: string };
}
