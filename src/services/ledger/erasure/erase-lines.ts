import type { EntityManager } from '@mikro-orm/postgresql';
import { canonicalJson } from '@/domain/ledger/canonical';
import { EMPTY_DRAFT } from '@/domain/paperwork/draft';
import type { Act } from '../../act/perform-act';
import type { ErasureDocument } from '../audit/erasures';

export interface ErasableContent {
  readonly line: string;
  readonly leaf: string;
  readonly role: string;
}

/** What the ledger still holds of a paperwork's content, by line, leaf hash and role. */
export const listErasable = (
  em: EntityManager,
  seriesId: string,
  paperworkId: string,
): Promise<ErasableContent[]> =>
  em.execute<ErasableContent[]>(
    `select l.index::text as line, encode(l.leaf_hash, 'hex') as leaf, c.role
     from record.ledger_line l
     join record.ledger_content c on c.series_id = l.series_id and c.line_index = l.index
     where l.series_id = ? and c.content is not null
       and (l.kind, c.role) in (('paperwork-handed-in', 'paperwork'), ('paperwork-decided', 'decision'))
       and l.line::jsonb #>> '{refs,paperwork}' = ?
     order by l.index, c.role`,
    [seriesId, paperworkId],
  );

interface FileRow {
  readonly id: string;
  readonly sha256: string | null;
  readonly keys: readonly string[];
}

/** Takes the files' rows away; what no other row names is to be removed, and its hash is given. */
const forgetFiles = async (
  { em, at }: Pick<Act, 'em' | 'at'>,
  seriesId: string,
  paperworkId: string,
  only: ReadonlySet<string> | undefined,
): Promise<readonly string[]> => {
  const rows = await em.execute<FileRow[]>(
    `select id, encode(sha256, 'hex') as sha256,
       to_jsonb(array_remove(array_remove(array[object_key, upload_key], null), '')
         || array(select value from jsonb_each_text(coalesce(previews, '{}')))) as keys
     from public.file where series_id = ? and paperwork_id = ?`,
    [seriesId, paperworkId],
  );
  const gone = new Set<string>();
  for (const { id, sha256, keys } of rows) {
    if (only !== undefined && sha256 !== null && !only.has(sha256)) continue;
    await em.execute('delete from public.file where series_id = ? and id = ?', [seriesId, id]);
    // The same bytes are kept once, under their hash, also for another paperwork or series.
    const [other] = await em.execute<{ n: number }[]>(
      "select 1 as n from public.file where sha256 = decode(?, 'hex') limit 1",
      [sha256 ?? ''],
    );
    if (other !== undefined) continue;
    if (sha256 !== null) gone.add(sha256);
    for (const key of keys)
      await em.execute(
        'insert into public.object_to_remove (series_id, key, since) values (?, ?, ?) on conflict do nothing',
        [seriesId, key, at],
      );
  }
  return [...gone].sort();
};

/**
 * Erases content of one paperwork inside an act: the lines' content and salts, the rows that held
 * it, draft, files and messages. The act's own line says what went, and never what it said.
 */
export const eraseLines = async (
  act: Act,
  what: {
    readonly seriesId: string;
    readonly paperworkId: string;
    readonly reason: string;
    readonly contents: readonly ErasableContent[];
    /** Only files with these hashes; all of the paperwork's where not given. */
    readonly files?: ReadonlySet<string>;
  },
): Promise<ErasureDocument> => {
  const { em, at } = act;
  const { seriesId, paperworkId, reason, contents } = what;
  await em.execute(
    `update public.paperwork set draft = ?::jsonb, state = 'withdrawn', version = version + 1,
       updated_at = ? where series_id = ? and id = ?`,
    [JSON.stringify(EMPTY_DRAFT), at, seriesId, paperworkId],
  );
  await em.execute(
    `update public.mail set subject = 'Erased', last_error = null, content = jsonb_set(
       jsonb_set(content, '{attachments}', '[]'), '{paragraphs}', '["The content of this message was erased."]')
     where series_id = ? and left(content #>> '{link,path}', ?) = ?`,
    [seriesId, PADDOCK.length + paperworkId.length, PADDOCK + paperworkId],
  );
  const files = await forgetFiles(act, seriesId, paperworkId, what.files);
  act.append(
    'erasure',
    contents.map(({ line, role }) => ({
      series_id: seriesId,
      line_index: line,
      role,
      paperwork_id: paperworkId,
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
    refs: { paperwork: paperworkId },
  });
  act.send('remove-objects', { seriesId });
  return document;
};

const PADDOCK = '/paddock/paperwork/';
