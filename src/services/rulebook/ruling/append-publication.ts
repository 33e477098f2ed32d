import type { Actor } from '@/domain/access/permission';
import { toHex } from '@/domain/ledger/bytes';
import type { LineKind } from '@/domain/ledger/line-kind';
import type { NewLedgerLine } from '../../act/append';
import type { Act } from '../../act/perform-act';
import { type Publication, publicationDocument } from '../publication';

const LINE: { readonly [K in Publication['kind']]: LineKind } = {
  edition: 'rulebook-published',
  bulletin: 'bulletin-published',
  clarification: 'clarification-published',
  waiver: 'waiver-published',
  withdrawal: 'clarification-withdrawn',
};

/** Appends what changes a class's rules, with its open ledger line. Returns the document's hash. */
export const appendPublication = (
  { append, line, at }: Act,
  actor: Actor,
  seriesId: string,
  classId: string,
  publication: Publication,
  shown: { readonly title: string; readonly inForceAt: string | null },
  /** What the line commits to beside the document. */
  more: NewLedgerLine['contents'] = {},
): string => {
  const { kind, content } = publication;
  const { document, hash } = publicationDocument(publication);
  append('rule_publication', [
    {
      series_id: seriesId,
      id: content.id,
      class_id: classId,
      kind,
      number: content.number,
      title: shown.title,
      document,
      hash,
      in_force_at: shown.inForceAt,
      published_at: at.toISOString(),
      published_by: actor.personId,
    },
  ]);
  line({
    seriesId,
    kind: LINE[kind],
    contents: { [kind]: { text: document, open: true }, ...more },
    refs: { [kind]: content.id },
  });
  return toHex(hash);
};
