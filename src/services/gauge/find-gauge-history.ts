import { type Actor, may, seriesWhere } from '@/domain/access/permission';
import { absent, type Failure } from '@/domain/failure';
import { isId } from '@/domain/is-id';
import type { Written } from '@/domain/quantity/dimension';
import { fail, ok, type Result } from '@/domain/result';
import { GaugeRow } from '@/entities/event/gauge';
import { Series } from '@/entities/series/series';
import { type RegisteredGauge, registered } from '../inspection/read/inspection-file';
import type { Ports } from '../ports';

const iso = (column: string): string =>
  `to_char(${column} at time zone 'UTC', 'YYYY-MM-DD"T"HH24:MI:SS.MS"Z"')`;

/** One state of the register; `certificateFile` opens the file that was kept with it. */
export interface GaugeEntry {
  readonly at: string;
  readonly by: string;
  readonly status: 'in-use' | 'withdrawn';
  readonly certificate?: RegisteredGauge['certificate'];
  readonly certificateFile?: string | undefined;
  readonly calibratedOn?: string | undefined;
  readonly dueOn?: string | undefined;
}

export interface GaugeCheckKept {
  readonly id: string;
  readonly at: string;
  readonly kind: 'ring' | 'zero';
  readonly ring: string | null;
  readonly event: string | null;
  readonly readings: readonly Written[];
  readonly expected: Written;
  readonly difference: Written;
  readonly allowed: Written;
  readonly good: boolean;
  readonly witness: string;
  readonly note: string;
  readonly by: string;
}

export interface GaugeHistory {
  readonly gauge: RegisteredGauge;
  readonly seriesId: string;
  readonly series: string;
  readonly zone: string;
  readonly manages: boolean;
  readonly entries: readonly GaugeEntry[];
  readonly checks: readonly GaugeCheckKept[];
  readonly faults: readonly {
    readonly id: string;
    readonly foundAt: string;
    readonly reason: string;
    readonly reviews: number;
  }[];
  /** What it measured, an inspection a row; a ring: the zeros set on it. */
  readonly measured: readonly {
    readonly inspectionId: string;
    readonly carNumber: string;
    readonly event: string;
    readonly readings: number;
    readonly zeros: number;
    readonly firstAt: string;
    readonly lastAt: string;
  }[];
}

/** A gauge's whole record, for whoever may read the register of its series. */
export const findGaugeHistory = async (
  deps: Pick<Ports, 'db'>,
  actor: Actor,
  { gaugeId }: { readonly gaugeId: string },
): Promise<Result<GaugeHistory, Failure>> => {
  const { db } = deps;
  const open = [...seriesWhere(actor, 'gauge.read')];
  const row =
    open.length === 0 || !isId(gaugeId)
      ? null
      : await db.findOne(GaugeRow, { id: gaugeId, seriesId: { $in: open } });
  if (row === null) return fail(absent());
  const { seriesId } = row;
  const key = [seriesId, gaugeId];
  const series = await db.findOneOrFail(Series, { id: seriesId });
  const entries = await db.execute<{ at: string; by: string; document: GaugeEntry }[]>(
    `select ${iso('g.received_at')} as at, p.name as by, g.document::jsonb as document
     from record.gauge_entry g join public.person p on p.id = g.recorded_by
     where g.series_id = ? and g.gauge_id = ? order by g.received_at, g.id`,
    key,
  );
  const checks = await db.execute<GaugeCheckKept[]>(
    `select c.id, ${iso('c.checked_at')} as at, c.kind, r.code as ring, v.name as event, c.readings,
            jsonb_build_object('text', c.expected_text, 'unit', c.expected_unit) as expected,
            jsonb_build_object('text', c.difference_text, 'unit', c.difference_unit) as difference,
            jsonb_build_object('text', c.allowed_text, 'unit', c.allowed_unit) as allowed,
            c.good, c.witness, c.note, p.name as by
     from record.gauge_check c join public.person p on p.id = c.recorded_by
     left join public.gauge r on r.series_id = c.series_id and r.id = c.ring_id
     left join public.event v on v.series_id = c.series_id and v.id = c.event_id
     where c.series_id = ? and c.gauge_id = ? order by c.checked_at desc, c.id`,
    key,
  );
  const faults = await db.execute<GaugeHistory['faults'][number][]>(
    `select f.id, ${iso('f.found_at')} as "foundAt", f.reason,
            (select count(*)::int from record.review_act a where a.series_id = f.series_id
             and a.fault_id = f.id and a.kind = 'opened') as reviews
     from record.gauge_fault f where f.series_id = ? and f.gauge_id = ? order by f.found_at desc`,
    key,
  );
  const measured = await db.execute<GaugeHistory['measured'][number][]>(
    `select i.id as "inspectionId", e.car_number as "carNumber", v.name as event,
            count(*) filter (where x.kind = 'reading')::int as readings,
            count(*) filter (where x.kind = 'zero')::int as zeros,
            ${iso('min(x.at)')} as "firstAt", ${iso('max(x.at)')} as "lastAt"
     from (
       select 'reading' as kind, series_id, inspection_id, occurred_at as at from record.reading
       where series_id = ? and gauge_id = ?
       union all
       select 'zero', series_id, inspection_id, occurred_at from record.zero
       where series_id = ? and (gauge_id = ? or ring_id = ?)
     ) x
     join public.inspection i on i.series_id = x.series_id and i.id = x.inspection_id
     join public.entry e on e.series_id = i.series_id and e.id = i.entry_id
     join public.event v on v.series_id = i.series_id and v.id = i.event_id
     group by i.id, e.car_number, v.name order by max(x.at) desc limit 200`,
    [...key, seriesId, gaugeId, gaugeId],
  );
  return ok({
    gauge: registered(row),
    seriesId,
    series: series.name,
    zone: series.zone,
    manages: may(actor, 'gauge.manage', seriesId),
    entries: entries.map(({ at, by, document }) => ({ ...document, at, by })),
    checks,
    faults,
    measured,
  });
};
