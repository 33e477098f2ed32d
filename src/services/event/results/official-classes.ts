import type { EntityManager } from '@mikro-orm/postgresql';
import { type Failure, failure } from '@/domain/failure';
import { fail, type Result } from '@/domain/result';

/** The classes of an event whose results are official, by id, with their names. */
export const officialClasses = async (
  em: EntityManager,
  { seriesId, eventId }: { readonly seriesId: string; readonly eventId: string },
): Promise<ReadonlyMap<string, string>> => {
  const rows = await em.execute<{ id: string; name: string; kind: string }[]>(
    `select distinct on (s.class_id) s.class_id as id, c.name, s.kind
     from record.result_statement s
     join public.class c on c.series_id = s.series_id and c.id = s.class_id
     where s.series_id = ? and s.event_id = ? order by s.class_id, s.number desc`,
    [seriesId, eventId],
  );
  return new Map(rows.filter(({ kind }) => kind === 'official').map(({ id, name }) => [id, name]));
};

/** Refuses to touch official results. */
export const refuseOfficial = (
  official: ReadonlyMap<string, string>,
  classIds: readonly string[],
): Result<never, Failure> | undefined => {
  const name = classIds.map((id) => official.get(id)).find((found) => found !== undefined);
  return name === undefined
    ? undefined
    : fail(
        failure(
          'not-in-this-state',
          `The results of ${name} are official. Take them back first, with the reason.`,
        ),
      );
};

/**
 * Of an event as a whole: official once every class with a car in it is, unofficial from the first
 * position that was written.
 */
export const resultsStateOf = (
  entries: readonly {
    readonly classId: string;
    readonly position?: number | null | undefined;
    readonly state: 'entered' | 'withdrawn';
  }[],
  official: { readonly has: (classId: string) => boolean },
): 'none' | 'unofficial' | 'official' => {
  const running = entries.filter(({ state }) => state === 'entered');
  if (running.length > 0 && running.every(({ classId }) => official.has(classId)))
    return 'official';
  const written = entries.some(
    ({ position, classId }) => (position ?? null) !== null || official.has(classId),
  );
  return written ? 'unofficial' : 'none';
};
