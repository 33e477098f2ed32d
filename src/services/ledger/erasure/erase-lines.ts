import type { EntityManager } from '@mikro-orm/postgresql';
import { canonicalJson } from '@/domain/ledger/canonical';
import type { Act } from '../../act/perform-act';
import type { ErasureDocument } from '../audit/erasures';
import { forgetPaperwork } from './forget-paperwork';

/** Whose content is erased: what was handed in, or the pen strokes on an inspection's reports. */
export interface ErasureSubject {
  readonly kind: 'paperwork' | 'inspection';
  readonly id: string;
}

export interface ErasableContent {
  readonly line: string;
  readonly leaf: string;
  readonly role: string;
}

/** What the ledger still holds of a subject's erasable content, by line, leaf hash and role. */
export const listErasable = (
  em: EntityManager,
  seriesId: string,
  { kind, id }: ErasureSubject,
): Promise<ErasableContent[]> =>
  em.execute<ErasableContent[]>(
    `select l.index::text as line, encode(l.leaf_hash, 'hex') as leaf, c.role
     from record.ledger_line l
     join record.ledger_content c on c.series_id = l.series_id and c.line_index = l.index
     where l.series_id = ? and c.content is not null
       and (l.kind, c.role) in (${
         kind === 'paperwork'
           ? "('paperwork-handed-in', 'paperwork'), ('paperwork-decided', 'decision')"
           : "('report-signed', 'strokes'), ('report-revised', 'strokes')"
       })
       and l.line::jsonb #>> '{refs,${kind}}' = ?
     order by l.index, c.role`,
    [seriesId, id],
  );

/**
 * Erases content inside an act: the lines' content and salts, the rows that held it, and of a
 * paperwork draft, files and messages. The act's own line says what went, and never what it said.
 */
export const eraseLines = async (
  act: Act,
  what: {
    readonly seriesId: string;
    readonly subject: ErasureSubject;
    readonly reason: string;
    readonly contents: readonly ErasableContent[];
    /** Only files with these hashes; all of the paperwork's where not given. */
    readonly files?: ReadonlySet<string>;
  },
): Promise<ErasureDocument> => {
  const { seriesId, subject, reason, contents } = what;
  const files =
    subject.kind === 'paperwork'
      ? await forgetPaperwork(act, seriesId, subject.id, what.files)
      : [];
  act.append(
    'erasure',
    contents.map(({ line, role }) => ({
      series_id: seriesId,
      line_index: line,
      role,
      [`${subject.kind}_id`]: subject.id,
    })),
  );
  const document: ErasureDocument = {
    document: 'tagwire/erasure',
    version: '1',
    reason,
    contents: contents.map(({ line, leaf, role }) => ({ line, leaf, role })),
    files: [...files],
  };
  act.line({
    seriesId,
    kind: 'content-erased',
    contents: { erasure: { text: canonicalJson(document), open: true } },
    refs: { [subject.kind]: subject.id },
  });
  act.send('remove-objects', { seriesId });
  return document;
};
