import { type DrawCommitment, readDrawCommitment, readDrawMade } from '@/domain/draw/documents';
import type { Round } from '@/domain/draw/select';
import { type DrawToVerify, verifyDraw } from '@/domain/draw/verify-draw';
import { sha256, toHex, utf8 } from '@/domain/ledger/bytes';
import type { Outcome, Step } from '@/domain/ledger/verify/step';

/** One thing to look at while a draw is run again. */
export interface Stage {
  readonly key: string;
  readonly title: string;
  readonly outcome: Outcome;
  readonly facts: readonly { readonly name: string; readonly value: string }[];
  readonly proves?: string;
  readonly doesNotProve?: string;
}

/** A checked step as a stage, with more facts. */
export const ofStep = (step: Step, more: Stage['facts'] = []): Stage => ({
  key: step.id,
  title: step.checked,
  outcome: step.outcome,
  facts: [{ name: 'Found', value: step.found }, ...more],
  proves: step.proves,
  doesNotProve: step.doesNotProve,
});

const ofRound = (
  { round, digest, left, remainder, chosen }: Round,
  pool: DrawCommitment['pool'],
): Stage => ({
  key: `round-${round}`,
  title: `Round ${round + 1}: car ${pool[chosen - 1]?.car ?? ''}`,
  outcome: 'passed',
  facts: [
    { name: `SHA-256 of ${round}, seed, ${round}`, value: toHex(digest) },
    { name: 'Cars left', value: String(left) },
    { name: `As a number, divided by ${left}, remainder`, value: String(remainder) },
    {
      name: 'Drawn',
      value: `place ${remainder + 1} among those left: number ${chosen}, car ${pool[chosen - 1]?.car ?? ''}`,
    },
  ],
});

/** A published draw run again: what was announced, secret, values, seed, each round, the result. */
export const stagesOf = (published: DrawToVerify): readonly Stage[] => {
  const { steps, run } = verifyDraw(published);
  const commitment = readDrawCommitment(published.commitment);
  const made = readDrawMade(published.made);
  const hash = toHex(sha256(utf8(published.commitment)));
  const extra: Readonly<Record<string, Stage['facts']>> = {
    'draw-announced': [{ name: 'SHA-256 of the announcement', value: hash }],
    'secret-kept': [
      { name: 'Secret', value: made.ok ? made.value.secret : '' },
      { name: 'Announced hash', value: commitment.ok ? commitment.value.secretHash : '' },
    ],
  };
  const shown = steps.map((step) => ofStep(step, extra[step.id]));
  if (run === undefined || !commitment.ok) return shown;
  const seed: Stage = {
    key: 'seed',
    title: 'Announcement, secret and values are hashed together: the seed.',
    outcome: 'passed',
    facts: [
      { name: 'Values, each in ascending order', value: run.values },
      { name: 'Seed', value: toHex(run.seed) },
    ],
  };
  const rounds = run.rounds.map((round) => ofRound(round, commitment.value.pool));
  return [...shown.slice(0, -1), seed, ...rounds, ...shown.slice(-1)];
};
