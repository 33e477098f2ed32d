import { type Failure, failure } from '../failure';
import { findHex, sameBytes, toHex } from '../ledger/bytes';
import { fail, ok, type Result } from '../result';
import { findCommitmentFault } from './commitment-fault';
import type { DrawCommitment, DrawMade } from './documents';
import { commitmentHash, SECRET_LENGTH, secretHash, seedOf } from './seed';
import { type Round, select } from './select';
import { findValueFault, type PublishedValue, valuesText } from './values';

export interface DrawRun {
  readonly values: string;
  readonly seed: Uint8Array;
  readonly rounds: readonly Round[];
  readonly selected: DrawMade['selected'];
}

/** The arithmetic alone: what a commitment, its secret and the values come to. */
export const runDraw = (
  commitment: DrawCommitment,
  secret: Uint8Array,
  published: readonly PublishedValue[],
): DrawRun => {
  const values = valuesText(published);
  const seed = seedOf(commitmentHash(commitment), secret, values);
  const rounds = select(seed, commitment.pool.length, Number(commitment.select));
  const selected = rounds.flatMap(({ chosen }) => commitment.pool[chosen - 1] ?? []);
  return { values, seed, rounds, selected };
};

/** The document of a draw; refused if secret or values are not those announced. */
export const makeDraw = (
  commitment: DrawCommitment,
  secret: Uint8Array,
  values: readonly PublishedValue[],
): Result<DrawMade, Failure> => {
  const fault = findCommitmentFault(commitment) ?? findValueFault(commitment.values, values);
  if (fault !== undefined) return fail(failure('not-in-this-state', fault));
  if (!isSecretOf(commitment, secret)) {
    return fail(failure('not-in-this-state', 'This is not the secret that was committed to.'));
  }
  return ok({
    v: '1',
    type: 'tagwire/draw-made',
    draw: commitment.draw,
    commitment: toHex(commitmentHash(commitment)),
    secret: toHex(secret),
    values: values.map(({ name, source, numbers }) => ({ name, source, numbers: [...numbers] })),
    selected: [...runDraw(commitment, secret, values).selected],
  });
};

export const isSecretOf = (commitment: DrawCommitment, secret: Uint8Array): boolean => {
  const expected = findHex(commitment.secretHash, 32);
  return (
    secret.length === SECRET_LENGTH &&
    expected !== undefined &&
    sameBytes(secretHash(secret), expected)
  );
};
