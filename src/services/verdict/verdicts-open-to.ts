import { openings } from '@/domain/access/paperwork-access';
import type { Actor } from '@/domain/access/permission';

/**
 * Verdicts that are open to the actor with all that was found, as SQL over `record.verdict v` and its
 * `public.entry e`: on their own entries, and on those of people who let them see verdicts; where only
 * some engines are meant, the inspection must rest on paperwork of one of them.
 */
export const verdictsOpenTo = (
  actor: Actor,
): { readonly sql: string; readonly parameters: readonly unknown[] } => {
  const [, ...others] = openings(actor, 'verdicts');
  const parts = others.map(({ competitorId, seriesIds, engineIds }) => ({
    sql: `(e.competitor_id = ? and v.series_id = any(?::uuid[])${
      engineIds === undefined
        ? ''
        : ` and exists (select from public.inspection i
             join public.paperwork p on p.series_id = i.series_id and p.id = i.paperwork_id
             where i.series_id = v.series_id and i.id = v.inspection_id
               and p.engine_id = any(?::uuid[]))`
    })`,
    parameters: [
      competitorId,
      `{${seriesIds.join(',')}}`,
      ...(engineIds === undefined ? [] : [`{${engineIds.join(',')}}`]),
    ],
  }));
  return {
    sql: `(${['e.competitor_id = ?', ...parts.map(({ sql }) => sql)].join(' or ')})`,
    parameters: [actor.personId, ...parts.flatMap(({ parameters }) => parameters)],
  };
};
