import * as z from 'zod/mini';
import { sha256, utf8 } from '../bytes';
import { parseCanonical } from '../canonical';
import { parseVerifierKey, type VerifierKey } from '../note/verifier-key';
import { checkLine } from './check-line';
import { lineCommitsTo } from './check-opening';
import type { LineProof } from './line-proof';
import { failed, passed, type Question, type Step } from './step';

/** The document a `key-published` line commits to under the role `key`. */
export const keyDocumentShape = z.strictObject({
  v: z.literal('1'),
  type: z.literal('tagwire/key'),
  /** The new verifier key. */
  key: z.string(),
  /** The key that hands over to it; empty for a ledger's first key. */
  replaces: z.string(),
});

export interface PublishedKey {
  readonly document: string;
  readonly salt: string;
  /** Its checkpoint must be signed with a key trusted before this one. */
  readonly proof: LineProof;
}

const ROTATED: Question = {
  id: 'key-rotated',
  checked: 'The key before this one recorded it in the ledger.',
  proves: 'Whoever held the older key named this one as its successor.',
  doesNotProve: 'That the older key was still in the right hands then.',
};

/** From the keys a reader trusts to those that followed, each vouched for by one before it. */
export const followKeys = (
  trusted: readonly VerifierKey[],
  published: readonly PublishedKey[],
): { readonly keys: readonly VerifierKey[]; readonly steps: readonly Step[] } => {
  let keys = trusted;
  const steps: Step[] = [];
  for (const { document, salt, proof } of published) {
    const next = nextKey(document, keys);
    const checked = checkLine(proof, keys);
    const vouched =
      checked.steps.every((step) => step.outcome === 'passed') &&
      checked.line?.kind === 'key-published' &&
      lineCommitsTo(checked.line, 'key', salt, sha256(utf8(document)));
    if (next === undefined || !vouched || next.name !== checked.checkpoint?.origin) {
      return { keys, steps: [...steps, failed(ROTATED, 'The hand-over does not hold.')] };
    }
    steps.push(passed(ROTATED, `Line ${checked.line?.index} names key ${next.id}.`));
    keys = [...keys, next];
  }
  return { keys, steps };
};

const nextKey = (document: string, keys: readonly VerifierKey[]): VerifierKey | undefined => {
  const json = parseCanonical(document);
  const shaped = json.ok ? keyDocumentShape.safeParse(json.value) : undefined;
  if (!shaped?.success) return undefined;
  const replaced = parseVerifierKey(shaped.data.replaces);
  const next = parseVerifierKey(shaped.data.key);
  const known =
    replaced.ok &&
    keys.some((key) => key.name === replaced.value.name && key.id === replaced.value.id);
  return known && next.ok ? next.value : undefined;
};
