import { type KeysAnswer, keysAnswer } from '@/contracts/ledger/answers';
import {
  formatVerifierKey,
  parseVerifierKey,
  type VerifierKey,
} from '@/domain/ledger/note/verifier-key';
import {
  followKeys,
  keyDocumentShape,
  type PublishedKey,
} from '@/domain/ledger/verify/follow-keys';
import type { Step } from '@/domain/ledger/verify/step';

export interface Trusted {
  /** Verifier keys that count, as text. */
  readonly keys: readonly string[];
  /** How one key led to the next; empty while there was only one. */
  readonly steps: readonly Step[];
}

export const readKeys = (text: string | undefined): KeysAnswer | undefined => {
  if (text === undefined) return undefined;
  try {
    const read = keysAnswer.safeParse(JSON.parse(text));
    return read.success ? read.data : undefined;
  } catch {
    return undefined;
  }
};

const keyOf = ({ document }: PublishedKey): string | undefined => {
  try {
    return keyDocumentShape.parse(JSON.parse(document)).key;
  } catch {
    return undefined;
  }
};

/**
 * The keys that count: from the one the reader brought, or else from the first that the series
 * publishes, along the hand-overs that each was signed for by the key before.
 */
export const trustedKeys = (pinned: string, published: readonly PublishedKey[]): Trusted => {
  const first = published[0];
  const root = pinned === '' ? first && keyOf(first) : pinned;
  const key = root === undefined ? undefined : parseVerifierKey(root);
  if (root === undefined || !key?.ok) return { keys: root === undefined ? [] : [root], steps: [] };
  const at = published.findIndex((one) => keyOf(one) === root);
  const later = at < 0 ? [] : published.slice(at + 1);
  const trusted: readonly VerifierKey[] = [key.value];
  const followed = followKeys(trusted, later);
  return { keys: followed.keys.map(formatVerifierKey), steps: followed.steps };
};
