import { EMPTY_DRAFT } from '@/domain/paperwork/draft';
import type { Act } from '../../act/perform-act';

interface FileRow {
  readonly id: string;
  readonly sha256: string | null;
  readonly keys: readonly string[];
}

const PADDOCK = '/paddock/paperwork/';
const OFFICE = '/office/paperwork/';

/** Takes the files' rows away; what no other row names is to be removed, and its hash is given. */
const forgetFiles = async (
  { em, at }: Pick<Act, 'em' | 'at'>,
  seriesId: string,
  paperworkId: string,
  only: ReadonlySet<string> | undefined,
): Promise<readonly string[]> => {
  // Locked, so that previews that are being made are seen here or not made at all.
  const rows = await em.execute<FileRow[]>(
    `select id, encode(sha256, 'hex') as sha256,
       to_jsonb(array_remove(array_remove(array[object_key, upload_key], null), '')
         || array(select value from jsonb_each_text(coalesce(previews, '{}')))) as keys
     from public.file where series_id = ? and paperwork_id = ? for update`,
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
 * Empties what is kept of a paperwork outside the record: draft, messages and files. Gives the hashes of
 * the files that went.
 */
export const forgetPaperwork = async (
  act: Pick<Act, 'em' | 'at'>,
  seriesId: string,
  paperworkId: string,
  /** Only files with these hashes; all of the paperwork's where not given. */
  only: ReadonlySet<string> | undefined,
): Promise<readonly string[]> => {
  const { em, at } = act;
  await em.execute(
    `update public.paperwork set draft = ?::jsonb, state = 'withdrawn', version = version + 1,
       updated_at = ? where series_id = ? and id = ?`,
    [JSON.stringify(EMPTY_DRAFT), at, seriesId, paperworkId],
  );
  await em.execute(
    `update public.mail set subject = 'Erased', last_error = null, content = jsonb_set(
       jsonb_set(content, '{attachments}', '[]'), '{paragraphs}', '["The content of this message was erased."]')
     where series_id = ? and (starts_with(content #>> '{link,path}', ?)
       or starts_with(content #>> '{link,path}', ?))`,
    [seriesId, PADDOCK + paperworkId, OFFICE + paperworkId],
  );
  return forgetFiles(act, seriesId, paperworkId, only);
};
