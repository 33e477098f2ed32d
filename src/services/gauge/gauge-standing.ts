import type { EntityManager } from '@mikro-orm/postgresql';
import type { GaugeFault } from '@/domain/inspection/capture/gauge-record';
import type { RingCheck } from '@/domain/inspection/gauge/ring-check';

/** What a gauge's record says beyond its figures: checks at one event, and when it was found bad. */
export interface GaugeStanding {
  readonly ringChecks?: readonly RingCheck[];
  readonly faults?: readonly GaugeFault[];
}

const iso = (column: string): string =>
  `to_char(${column} at time zone 'UTC', 'YYYY-MM-DD"T"HH24:MI:SS.MS"Z"')`;

/** By gauge id; a gauge without checks or faults is left out. */
export const readStandings = async (
  em: EntityManager,
  seriesId: string,
  eventId: string,
): Promise<ReadonlyMap<string, GaugeStanding>> => {
  const checks = await em.execute<(RingCheck & { gauge: string; text: string; unit: string })[]>(
    `select c.id, c.gauge_id as gauge, r.code as ring, ${iso('c.checked_at')} as at,
            c.difference_text as text, c.difference_unit as unit
     from record.gauge_check c
     join public.gauge r on r.series_id = c.series_id and r.id = c.ring_id
     where c.series_id = ? and c.event_id = ? order by c.checked_at, c.id`,
    [seriesId, eventId],
  );
  const faults = await em.execute<{ gauge: string; good: string | null; found: string }[]>(
    `select gauge_id as gauge, ${iso('good_until')} as good, ${iso('found_at')} as found
     from record.gauge_fault where series_id = ? order by found_at, id`,
    [seriesId],
  );
  const gauges = new Set([...checks, ...faults].map(({ gauge }) => gauge));
  return new Map(
    [...gauges].map((id): [string, GaugeStanding] => {
      const ringChecks = checks.flatMap(({ gauge, id: check, at, ring, text, unit }) =>
        gauge === id ? [{ id: check, at, ring, difference: { text, unit } }] : [],
      );
      const own = faults.flatMap(({ gauge, good, found }): readonly GaugeFault[] =>
        gauge === id ? [{ ...(good === null ? {} : { goodUntil: good }), foundAt: found }] : [],
      );
      return [
        id,
        {
          ...(ringChecks.length === 0 ? {} : { ringChecks }),
          ...(own.length === 0 ? {} : { faults: own }),
        },
      ];
    }),
  );
};
