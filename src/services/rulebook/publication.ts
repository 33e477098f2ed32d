import { sha256, utf8 } from '@/domain/ledger/bytes';
import { canonicalJson } from '@/domain/ledger/canonical';
import type { Bulletin } from '@/domain/rulebook/bulletin';
import { toDocument } from '@/domain/rulebook/document';
import type { Edition } from '@/domain/rulebook/edition';
import type { Clarification, Waiver, Withdrawal } from '@/domain/rulebook/ruling';

export type Publication =
  | { readonly kind: 'edition'; readonly content: Edition }
  | { readonly kind: 'bulletin'; readonly content: Bulletin }
  | { readonly kind: 'clarification'; readonly content: Clarification }
  | { readonly kind: 'waiver'; readonly content: Waiver }
  | { readonly kind: 'withdrawal'; readonly content: Withdrawal };

/** What a publication of each kind is called before its number. */
export const PUBLICATION_NAMES: { readonly [K in Publication['kind']]: string } = {
  edition: 'Edition',
  bulletin: 'Bulletin',
  clarification: 'Clarification',
  waiver: 'Waiver',
  withdrawal: 'Withdrawal',
};

/** The exact text that is kept, hashed and committed to (RFC 8785, numbers as strings). */
export const publicationDocument = (
  publication: Publication,
): { readonly document: string; readonly hash: Uint8Array } => {
  const { kind, content } = publication;
  const document = canonicalJson(
    toDocument({ document: `tagwire/${kind}`, version: '1', content }),
  );
  return { document, hash: sha256(utf8(document)) };
};
