import type { Ports } from '../../ports';

/** Removes the objects that an erasure left unnamed. What fails stays listed, and the job comes back. */
export const removeObjects = async (
  { db, objects }: Pick<Ports, 'db' | 'objects'>,
  { seriesId }: { readonly seriesId: string },
): Promise<void> => {
  const rows = await db.execute<{ key: string }[]>(
    'select key from public.object_to_remove where series_id = ? order by since, key',
    [seriesId],
  );
  for (const { key } of rows) {
    // The same picture may have been handed in again since.
    const [named] = await db.execute<{ n: number }[]>(
      'select 1 as n from public.file where object_key = ? or previews::text like ? limit 1',
      [key, `%${key}%`],
    );
    if (named === undefined) await objects.remove(key);
    await db.execute('delete from public.object_to_remove where series_id = ? and key = ?', [
      seriesId,
      key,
    ]);
  }
};
