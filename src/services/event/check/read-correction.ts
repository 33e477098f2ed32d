import type { EntityManager } from '@mikro-orm/postgresql';
import type { CheckRequest } from '@/contracts/event/check';
import { type Failure, invalid } from '@/domain/failure';
import type { Written } from '@/domain/quantity/dimension';
import { fail, ok, type Result } from '@/domain/result';

/** What stands for a car and a clause, to be said again with another gauge. */
export interface Corrected {
  readonly value: Written;
  /** When it was read: a gauge is judged by what it was then. */
  readonly takenAt: string;
  readonly reason: string;
}

interface Row {
  readonly state: string;
  readonly text: string | null;
  readonly unit: string | null;
  readonly gauge: string | null;
  readonly at: string;
}

const refuse = (pointer: string, detail: string) => fail(invalid([{ pointer, detail }]));

/** The last reading of a check that was written down under a wrong gauge, with why that is corrected. */
export const readCorrection = async (
  em: EntityManager,
  { seriesId, eventId }: { readonly seriesId: string; readonly eventId: string },
  asked: Pick<CheckRequest, 'entryId' | 'clause' | 'gaugeId'> & { readonly correction: string },
): Promise<Result<Corrected, Failure>> => {
  const reason = asked.correction.trim();
  if (reason === '') return refuse('/correction', 'Write why the gauge is corrected.');
  const [last] = await em.execute<Row[]>(
    `select state, value_text as text, value_unit as unit, gauge_id as gauge,
            to_char(taken_at at time zone 'UTC', 'YYYY-MM-DD"T"HH24:MI:SS.MS"Z"') as at
     from record.event_check
     where series_id = ? and event_id = ? and entry_id = ? and clause = ?
     order by received_at desc, id desc limit 1`,
    [seriesId, eventId, asked.entryId, asked.clause],
  );
  if (last === undefined || last.text === null || last.unit === null)
    return refuse('/correction', 'No reading stands here whose gauge could be corrected.');
  if (last.gauge === asked.gaugeId)
    return refuse('/gaugeId', 'It stands under this gauge already. Choose the one it was read on.');
  return ok({ value: { text: last.text, unit: last.unit }, takenAt: last.at, reason });
};
