import type { EntityManager } from '@mikro-orm/postgresql';
import { readPaperworkDocument } from '@/contracts/paperwork/document';
import { assessInspection } from '@/domain/inspection/assess-inspection';
import type { GaugeRecord } from '@/domain/inspection/capture/gauge-record';
import { toHex } from '@/domain/ledger/bytes';
import { declaredFacts } from '@/domain/paperwork/declared-facts';
import type { RulesInForce } from '@/domain/rulebook/rules-in-force';
import type { PastCase } from '@/domain/rulebook/trial/try-rules';
import type { BoreLayout } from '@/domain/tappet/layout/bore-layout';
import { GaugeRow } from '@/entities/event/gauge';
import { readStandings } from '../../gauge/gauge-standing';
import { registered } from '../../inspection/read/inspection-file';
import { readRowsOf } from '../../inspection/read/rows';
import { getRules } from '../find-rules';

/** Inspections read and assessed together: enough to ask little, few enough to hold. */
const TOGETHER = 100;

interface Row {
  readonly id: string;
  readonly event_id: string;
  readonly car_number: string;
  readonly event_number: number;
  readonly zone: string;
  readonly layout: BoreLayout;
  readonly rules_hash: Buffer;
  readonly document: unknown;
}

/** The register as it stood at each event: its gauges, checked on the ring there or found bad since. */
const gaugesByEvent = async (
  em: EntityManager,
  seriesId: string,
  eventIds: ReadonlySet<string>,
): Promise<ReadonlyMap<string, readonly GaugeRecord[]>> => {
  const rows = await em.find(GaugeRow, { seriesId });
  const found = new Map<string, readonly GaugeRecord[]>();
  for (const eventId of eventIds) {
    const standings = await readStandings(em, seriesId, eventId);
    found.set(
      eventId,
      rows.map((row) => ({ ...registered(row), ...standings.get(row.id) })),
    );
  }
  return found;
};

/** What was found in every closed inspection of these classes, as facts for a trial of rules; the newest first. */
export const readPastFindings = async (
  em: EntityManager,
  seriesId: string,
  classIds: readonly string[],
): Promise<readonly PastCase[]> => {
  const inspections = await em.execute<Row[]>(
    `select i.id, i.event_id, n.car_number, e.number as event_number, e.zone, i.layout, i.rules_hash,
       v.document::jsonb as document
     from public.inspection i
     join public.entry n on n.series_id = i.series_id and n.id = i.entry_id
     join public.event e on e.series_id = i.series_id and e.id = i.event_id
     left join record.paperwork_version v on v.series_id = i.series_id
       and v.paperwork_id = i.paperwork_id and v.number = i.paperwork_number
     where i.series_id = ? and n.class_id = any(?::uuid[]) and i.closed_at is not null
     order by i.closed_at desc, i.id`,
    [seriesId, `{${classIds.join(',')}}`],
  );
  const gauges = await gaugesByEvent(em, seriesId, new Set(inspections.map((row) => row.event_id)));
  const rules = new Map<string, RulesInForce>();
  for (const { rules_hash } of inspections) {
    const hash = toHex(rules_hash);
    if (!rules.has(hash)) rules.set(hash, await getRules(em, seriesId, rules_hash));
  }
  const cases: PastCase[] = [];
  for (let from = 0; from < inspections.length; from += TOGETHER) {
    const some = inspections.slice(from, from + TOGETHER);
    const ids = some.map((row) => row.id);
    const rowsOf = await readRowsOf(em, seriesId, ids);
    for (const row of some) {
      const read = readPaperworkDocument(row.document);
      const paperwork = read.ok ? read.value : undefined;
      const engineId = paperwork?.engine.id;
      const bearer = {
        carNumber: row.car_number,
        ...(engineId !== undefined && { engineId }),
      };
      const { facts } = assessInspection({
        rules: rules.get(toHex(row.rules_hash)) as RulesInForce,
        bearer,
        layout: row.layout,
        zone: row.zone,
        ...rowsOf(row.id),
        gauges: gauges.get(row.event_id) ?? [],
        paperwork: paperwork && declaredFacts(paperwork),
      });
      cases.push({
        id: row.id,
        name: `Car ${row.car_number}, event ${row.event_number}`,
        bearer,
        facts,
      });
    }
  }
  return cases;
};
