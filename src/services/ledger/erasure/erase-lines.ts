import type { EntityManager } from '@mikro-orm/postgresql';
import { canonicalJson } from '@/domain/ledger/canonical';
import type { Act } from '../../act/perform-act';
import type { ErasureDocument } from '../audit/erasures';
import { forgetPaperwork } from './forget-paperwork';

/**
 * Whose content is erased: what was handed in and said beside it, the pen strokes on an inspection's
 * reports, or the names and reasons given on an event's day.
 */
export interface ErasureSubject {
  readonly kind: 'paperwork' | 'inspection' | 'event';
  readonly id: string;
}

/** Kinds of lines and the roles of theirs that go with a subject. Migration 0026 has the same list. */
const ROLES: Readonly<Record<ErasureSubject['kind'], readonly (readonly [string, string])[]>> = {
  paperwork: [
    ['paperwork-handed-in', 'paperwork'],
    ['paperwork-handed-in', 'signature'],
    ['paperwork-decided', 'decision'],
    ['paperwork-withdrawn', 'withdrawal'],
    ['engine-swapped', 'swap'],
  ],
  inspection: [
    ['report-signed', 'strokes'],
    ['report-revised', 'strokes'],
  ],
  event: [
    ['entries-changed', 'changes'],
    ['bulletin-acknowledged', 'acknowledgement'],
    ['part-tagged', 'part'],
    ['custody-recorded', 'custody'],
    ['seal-recorded', 'seal'],
    ['gauge-checked', 'check'],
  ],
};

/** Line `l` and content `c` are of a kind and role that can be erased with the subject. */
export const erasableWith = (kind: ErasureSubject['kind']): string =>
  `(l.kind, c.role) in (${ROLES[kind].map(([line, role]) => `('${line}', '${role}')`).join(', ')})`;

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
       and ${erasableWith(kind)}
       and ${kind === 'event' ? 'append.event_of_line(l)::text' : `l.line::jsonb #>> '{refs,${kind}}'`} = ?
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
