import type { EntityManager } from '@mikro-orm/postgresql';
import type { GaugeRow } from '@/entities/event/gauge';

/** Until when a gauge is known to have read right, and by what. */
export interface LastGood {
  /** ISO 8601 in UTC; nothing where there is neither a good check nor a calibration. */
  readonly at?: string;
  readonly because: string;
}

/**
 * The last good check before an instant, or the calibration where that is later. A calibration counts
 * from the start of its day in UTC: the look-back takes a few hours too much, never too little.
 */
export const findLastGood = async (
  em: EntityManager,
  { seriesId, id, description }: Pick<GaugeRow, 'seriesId' | 'id' | 'description'>,
  before: string,
): Promise<LastGood> => {
  const [check] = await em.execute<{ at: string; ring: string | null }[]>(
    `select to_char(c.checked_at at time zone 'UTC', 'YYYY-MM-DD"T"HH24:MI:SS.MS"Z"') as at,
            r.code as ring
     from record.gauge_check c
     left join public.gauge r on r.series_id = c.series_id and r.id = c.ring_id
     where c.series_id = ? and c.gauge_id = ? and c.good and c.checked_at <= ?
     order by c.checked_at desc limit 1`,
    [seriesId, id, before],
  );
  const { calibratedOn } = description;
  const calibrated =
    calibratedOn === undefined || `${calibratedOn}T00:00:00.000Z` > before
      ? undefined
      : `${calibratedOn}T00:00:00.000Z`;
  if (check !== undefined && (calibrated === undefined || check.at >= calibrated)) {
    const where = check.ring === null ? 'at its zero' : `on the ring ${check.ring}`;
    return { at: check.at, because: `its last good check ${where}` };
  }
  return calibrated === undefined
    ? { because: 'no good check and no calibration on record' }
    : { at: calibrated, because: 'its calibration' };
};
