import type { Ports } from '../../ports';

/**
 * One word for how far a series' barn has come: it changes with every act that tablets are told of.
 * Whoever comes back with the same word has missed nothing.
 */
export const readMark = async (deps: Pick<Ports, 'db'>, seriesId: string): Promise<string> => {
  const [row] = await deps.db.execute<{ mark: string }[]>(
    `select concat_ws('.',
       (select count(*) from public.inspection where series_id = ?),
       (select coalesce(sum(version), 0) from public.inspection where series_id = ?),
       (select count(*) from record.capture_batch where series_id = ?),
       (select count(*) from record.event_check where series_id = ?)) as mark`,
    [seriesId, seriesId, seriesId, seriesId],
  );
  if (row === undefined) throw new Error('A count gave no row.');
  return row.mark;
};

/** How far each of several series has come; read before what a page shows. */
export const readMarks = async (
  deps: Pick<Ports, 'db'>,
  seriesIds: readonly string[],
): Promise<readonly { readonly id: string; readonly mark: string }[]> => {
  const marks: { id: string; mark: string }[] = [];
  for (const id of seriesIds) marks.push({ id, mark: await readMark(deps, id) });
  return marks;
};
