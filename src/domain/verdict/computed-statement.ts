import type { State } from '../rulebook/clause-result';
import type { ComputedStatement } from './notice/notice';

export interface StatedFinding {
  readonly clause: string;
  readonly advisory: boolean;
  readonly pass: boolean | null;
  /** What stands at each position, where that is known. */
  readonly perPosition?:
    | readonly {
        readonly state: State;
        readonly pass: boolean | null;
        readonly sentence: string;
      }[]
    | undefined;
}

/**
 * What the mandatory findings of a signed report add up to. One that fails makes it `fail`; where
 * none has a statement there is none. It is no verdict.
 */
export const computedStatement = (findings: readonly StatedFinding[]): ComputedStatement => {
  const stated = findings.filter((finding) => !finding.advisory && finding.pass !== null);
  if (stated.some((finding) => finding.pass === false)) return 'fail';
  return stated.length === 0 ? 'none' : 'pass';
};

/** Whether the decision is what the computed statement says: breach on `fail`, no breach on anything else. */
export const agreesWithStatement = (
  decision: 'breach' | 'no-breach',
  computed: ComputedStatement,
): boolean => (decision === 'breach') === (computed === 'fail');
