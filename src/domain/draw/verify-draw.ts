import { findHex, toHex } from '../ledger/bytes';
import {
  answer,
  failed,
  notChecked,
  passed,
  type Question,
  type Step,
} from '../ledger/verify/step';
import { SEED_BITS } from './commitment-fault';
import { type DrawCommitment, type DrawMade, readDrawCommitment, readDrawMade } from './documents';
import { bitsNeeded } from './entropy';
import { type DrawRun, isSecretOf, runDraw } from './make-draw';
import { commitmentHash } from './seed';
import { findValueFault } from './values';

/** The two published documents, as their exact canonical text. */
export interface DrawToVerify {
  readonly commitment: string;
  readonly made: string;
}

export interface VerifiedDraw {
  readonly steps: readonly Step[];
  /** The draw run again, round by round; absent if it could not be run. */
  readonly run?: DrawRun;
}

const ANNOUNCED: Question = {
  id: 'draw-announced',
  checked: 'The numbered pool, how many are drawn and the values to come are stated in full.',
  proves: 'The rules of the draw are fixed by this document.',
  doesNotProve: 'That it was published before the session: its ledger line and your receipt do.',
};

const SAME: Question = {
  id: 'same-draw',
  checked: 'The result belongs to exactly this announcement.',
  proves: 'Pool, number drawn and values were not changed afterwards.',
  doesNotProve: 'That every car that should be in the pool is in it; read the list.',
};

const SECRET: Question = {
  id: 'secret-kept',
  checked: 'The secret shown now is the one whose hash was announced.',
  proves: 'The officials did not pick the secret after they knew the values.',
  doesNotProve: 'That they kept it to themselves until then.',
};

const VALUES: Question = {
  id: 'values-announced',
  checked: 'The values are the ones announced, and a missing one was treated as announced.',
  proves: 'No value was added, dropped or swapped.',
  doesNotProve:
    'That the numbers are the true ones; compare them with the place they are published.',
};

const RANDOM: Question = {
  id: 'enough-randomness',
  checked:
    'The secret and the values hold enough randomness for this pool (RFC 3797, section 3.3).',
  proves: 'Every possible selection could have come out.',
  doesNotProve: 'That the secret was made by a good source of randomness.',
};

const RESULT: Question = {
  id: 'same-cars',
  checked: 'Running the draw again gives the same cars in the same order.',
  proves: 'Nobody could steer the draw who did not both know the secret and set the values.',
  doesNotProve: 'That those who knew the secret and those who set the values were strangers.',
};

/** Re-runs a published draw, a step at a time. */
export const verifyDraw = (published: DrawToVerify): VerifiedDraw => {
  const commitment = readDrawCommitment(published.commitment);
  const made = readDrawMade(published.made);
  if (!commitment.ok) return { steps: [failed(ANNOUNCED, commitment.failure.detail)] };
  const { pool, select } = commitment.value;
  const announced = passed(ANNOUNCED, `${select} of ${pool.length} cars.`);
  if (!made.ok) return { steps: [announced, failed(SAME, made.failure.detail)] };
  return verifyRead(commitment.value, made.value, announced);
};

const verifyRead = (commitment: DrawCommitment, made: DrawMade, announced: Step): VerifiedDraw => {
  const secret = findHex(made.secret, 32) ?? new Uint8Array();
  const valueFault = findValueFault(commitment.values, made.values);
  const hash = toHex(commitmentHash(commitment));
  const steps = [
    announced,
    answer(
      SAME,
      made.draw === commitment.draw && made.commitment === hash,
      `SHA-256 of the announcement: ${hash}.`,
      'The result names another announcement.',
    ),
    answer(
      SECRET,
      isSecretOf(commitment, secret),
      'Its hash is the announced one.',
      'Its hash is not the announced one.',
    ),
    valueFault === undefined
      ? passed(VALUES, `${made.values.length} as announced.`)
      : failed(VALUES, valueFault),
  ];
  if (valueFault !== undefined) {
    return { steps: [...steps, notChecked(RESULT, 'The values do not hold.')] };
  }
  const run = runDraw(commitment, secret, made.values);
  const needed = bitsNeeded(commitment.pool.length, Number(commitment.select));
  const cars = run.selected.map(({ car }) => car).join(', ');
  return {
    steps: [
      ...steps,
      passed(RANDOM, `${needed} bits are needed; the seed holds up to ${SEED_BITS}.`),
      answer(
        RESULT,
        sameCars(run.selected, made.selected),
        `Drawn: ${cars}.`,
        `The draw comes to ${cars}.`,
      ),
    ],
    run,
  };
};

const sameCars = (a: DrawMade['selected'], b: DrawMade['selected']): boolean =>
  a.length === b.length &&
  a.every(({ number, car }, i) => number === b[i]?.number && car === b[i]?.car);
