/** One thing a verifier looked at, in words for a person who knows no cryptography. */
export interface Step {
  /** Permanent name, for tests and links. */
  readonly id: string;
  /** What was checked. */
  readonly checked: string;
  readonly outcome: Outcome;
  /** What was found. */
  readonly found: string;
  readonly proves: string;
  readonly doesNotProve: string;
}

export type Outcome = 'passed' | 'failed' | 'not checked';

/** A question a step answers, before the answer. */
export type Question = Pick<Step, 'id' | 'checked' | 'proves' | 'doesNotProve'>;

export const passed = (question: Question, found: string): Step => ({
  ...question,
  outcome: 'passed',
  found,
});

export const failed = (question: Question, found: string): Step => ({
  ...question,
  outcome: 'failed',
  found,
});

export const notChecked = (question: Question, found: string): Step => ({
  ...question,
  outcome: 'not checked',
  found,
});

export const answer = (question: Question, holds: boolean, yes: string, no: string): Step =>
  holds ? passed(question, yes) : failed(question, no);

/** One failed step fails the whole; a step not checked leaves the whole incomplete. */
export const conclude = (steps: readonly Step[]): Outcome => {
  if (steps.some((step) => step.outcome === 'failed')) return 'failed';
  const checkedAll = steps.length > 0 && steps.every((step) => step.outcome === 'passed');
  return checkedAll ? 'passed' : 'not checked';
};
