import { lockContent } from '../../file/content/hold-object';
import type { Ports } from '../../ports';

const hashIn = (key: string): string => /[0-9a-f]{64}/.exec(key)?.[0] ?? key;

/**
 * Removes the objects that an erasure left unnamed. What fails stays listed, and the job comes back.
 * Whoever hands the same content in meanwhile waits, and then finds that it is to be written again.
 */
export const removeObjects = async (
  { db, objects }: Pick<Ports, 'db' | 'objects'>,
  { seriesId }: { readonly seriesId: string },
): Promise<void> => {
  const rows = await db.execute<{ key: string }[]>(
    'select key from public.object_to_remove where series_id = ? order by since, key',
    [seriesId],
  );
  for (const { key } of rows)
    await db.fork().transactional(async (em) => {
      await lockContent(em, hashIn(key));
      // The same picture may have been handed in again since.
      const [named] = await em.execute<{ n: number }[]>(
        'select 1 as n from public.file where object_key = ? or previews::text like ? limit 1',
        [key, `%${key}%`],
      );
      if (named === undefined) await objects.remove(key);
      await em.execute('delete from public.object_to_remove where series_id = ? and key = ?', [
        seriesId,
        key,
      ]);
    });
};
