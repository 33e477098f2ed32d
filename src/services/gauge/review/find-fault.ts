import { type Actor, may, seriesWhere } from '@/domain/access/permission';
import { absent, type Failure } from '@/domain/failure';
import { isId } from '@/domain/is-id';
import type { Written } from '@/domain/quantity/dimension';
import { fail, ok, type Result } from '@/domain/result';
import type { Ports } from '../../ports';
import { type LookBack, lookBack } from './look-back';
import { type Review, readReviews } from './read-reviews';

/** A gauge found bad, with everything that relied on it and the reviews that were opened. */
export interface FaultFound {
  readonly id: string;
  readonly seriesId: string;
  readonly series: string;
  readonly zone: string;
  readonly gaugeId: string;
  readonly gauge: string;
  readonly foundAt: string;
  readonly goodUntil: string | null;
  readonly goodBecause: string;
  readonly off: Written | null;
  readonly reason: string;
  readonly by: string;
  readonly line: number | null;
  readonly lookBack: LookBack;
  readonly reviews: readonly Review[];
  /** Whether the actor may say what becomes of the verdicts. */
  readonly decides: boolean;
}

type Row = Omit<FaultFound, 'off' | 'lookBack' | 'reviews' | 'decides'> & {
  readonly text: string | null;
  readonly unit: string | null;
};

const iso = (column: string): string =>
  `to_char(${column} at time zone 'UTC', 'YYYY-MM-DD"T"HH24:MI:SS.MS"Z"')`;

export const findFault = async (
  deps: Pick<Ports, 'db'>,
  actor: Actor,
  { id }: { readonly id: string },
): Promise<Result<FaultFound, Failure>> => {
  const series = seriesWhere(actor, 'gauge.read');
  if (series.length === 0 || !isId(id)) return fail(absent());
  const [row] = await deps.db.execute<Row[]>(
    `select f.id, f.series_id as "seriesId", s.name as series, s.zone, g.id as "gaugeId",
            g.code as gauge, ${iso('f.found_at')} as "foundAt", ${iso('f.good_until')} as "goodUntil",
            f.good_because as "goodBecause", f.off_text as text, f.off_unit as unit, f.reason,
            p.name as by, l.index::int as line
     from record.gauge_fault f
     join public.series s on s.id = f.series_id
     join public.gauge g on g.series_id = f.series_id and g.id = f.gauge_id
     join public.person p on p.id = f.recorded_by
     left join record.ledger_line l on l.series_id = f.series_id and l.act_id = f.act_id
     where f.id = ? and f.series_id in (${series.map(() => '?').join(', ')})`,
    [id, ...series],
  );
  if (row === undefined) return fail(absent());
  const { text, unit, ...fault } = row;
  const { seriesId, gaugeId, goodUntil, foundAt } = fault;
  const doubt = { gaugeId, after: goodUntil ?? undefined, until: foundAt };
  return ok({
    ...fault,
    off: text === null || unit === null ? null : { text, unit },
    lookBack: await lookBack(deps.db, seriesId, doubt),
    reviews: await readReviews(deps.db, 'o.series_id = ? and o.fault_id = ?', [seriesId, id]),
    decides: may(actor, 'verdict.decide', seriesId),
  });
};
