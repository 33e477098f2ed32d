import type { Actor } from '@/domain/access/permission';
import { toHex } from '@/domain/ledger/bytes';
import { canonicalJson } from '@/domain/ledger/canonical';

/** What the signature says, for the line to commit to: over which report, by whom, how recently signed in. */
export const signatureDocument = (
  actor: Pick<Actor, 'personId' | 'authenticatedAt'>,
  report: Uint8Array,
  at: Date,
): string =>
  canonicalJson({
    document: 'tagwire/signature',
    version: '1',
    kind: 'fresh-authentication',
    report: toHex(report),
    signer: actor.personId,
    authenticatedAt: actor.authenticatedAt,
    signedAt: at.toISOString(),
  });
