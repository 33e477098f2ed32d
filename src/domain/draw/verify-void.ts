import { findHex, toHex } from '../ledger/bytes';
import {
  answer,
  failed,
  notChecked,
  passed,
  type Question,
  type Step,
} from '../ledger/verify/step';
import { readDrawCommitment, readDrawVoid } from './documents';
import { isSecretOf } from './make-draw';
import { commitmentHash } from './seed';

const SAME: Question = {
  id: 'same-draw',
  checked: 'The void draw is exactly the one announced.',
  proves: 'This announcement can never be drawn: a draw after it names it.',
  doesNotProve: 'That the reason given is a good one; it is there to be read.',
};

const SECRET: Question = {
  id: 'secret-kept',
  checked: 'The secret is shown although the draw is void.',
  proves: 'With the values, anybody can see what the draw would have been.',
  doesNotProve: 'That the officials had not looked before they declared it void.',
};

/** Checks a draw that was declared void, from the two documents' exact text. */
export const verifyVoid = (published: {
  readonly commitment: string;
  readonly ended: string;
}): readonly Step[] => {
  const commitment = readDrawCommitment(published.commitment);
  if (!commitment.ok) return [failed(SAME, commitment.failure.detail)];
  const ended = readDrawVoid(published.ended);
  if (!ended.ok) return [failed(SAME, ended.failure.detail)];
  const { draw, secret, reason } = ended.value;
  const same =
    draw === commitment.value.draw &&
    ended.value.commitment === toHex(commitmentHash(commitment.value));
  return [
    same ? passed(SAME, `Void: ${reason}`) : failed(SAME, 'It names another announcement.'),
    secret === ''
      ? notChecked(SECRET, 'The secret is said to be lost.')
      : answer(
          SECRET,
          isSecretOf(commitment.value, findHex(secret, 32) ?? new Uint8Array()),
          'Its hash is the announced one.',
          'Its hash is not the announced one.',
        ),
  ];
};
