import type { EntityManager } from '@mikro-orm/postgresql';
import { readPaperworkDocument } from '@/contracts/paperwork/document';
import type { GaugeRecord } from '@/domain/inspection/capture/gauge-record';
import { chainStart } from '@/domain/ledger/chain';
import type { PaperworkDocument } from '@/domain/paperwork/document';
import type { Written } from '@/domain/quantity/dimension';
import type { RulesInForce } from '@/domain/rulebook/rules-in-force';
import { Entry } from '@/entities/event/entry';
import { Event } from '@/entities/event/event';
import { GaugeRow } from '@/entities/event/gauge';
import type { Inspection } from '@/entities/event/inspection';
import { Person } from '@/entities/people/person';
import { RaceClass } from '@/entities/series/race-class';
import { readStandings } from '../../gauge/gauge-standing';
import { getRules } from '../../rulebook/find-rules';
import { type RecordedRows, readRows } from './rows';

/** A gauge of the register with what the domain does not need: its name, a ring's size, its status. */
export interface RegisteredGauge extends GaugeRecord {
  readonly name: string;
  readonly size?: Written | undefined;
  readonly certificateFile?: string | undefined;
}

/** Everything about one inspection that an inspector, a signer or a panel looks at. */
export interface InspectionFile {
  readonly inspection: Inspection;
  readonly entry: Entry;
  readonly event: Event;
  readonly className: string;
  readonly inspector: string | null;
  readonly rules: RulesInForce;
  readonly gauges: readonly RegisteredGauge[];
  readonly rows: RecordedRows;
  readonly paperwork: PaperworkDocument | null;
  readonly chain: { readonly batches: number; readonly head: Uint8Array };
}

export const registered = (row: GaugeRow): RegisteredGauge => ({
  id: row.id,
  code: row.code,
  withdrawn: row.status === 'withdrawn',
  ...row.description,
});

/** The chain of an inspection as far as it has come. */
export const readChain = async (
  em: EntityManager,
  seriesId: string,
  inspectionId: string,
): Promise<InspectionFile['chain']> => {
  const [last] = await em.execute<{ number: number; head: Buffer }[]>(
    `select number, head from record.capture_batch
     where series_id = ? and inspection_id = ? order by number desc limit 1`,
    [seriesId, inspectionId],
  );
  return last === undefined
    ? { batches: 0, head: chainStart(inspectionId) }
    : { batches: last.number, head: new Uint8Array(last.head) };
};

const findPaperwork = async (
  em: EntityManager,
  { seriesId, paperworkId, paperworkNumber }: Inspection,
): Promise<PaperworkDocument | null> => {
  if (paperworkId === null || paperworkNumber === null) return null;
  const [row] = await em.execute<{ document: unknown }[]>(
    `select document::jsonb as document from record.paperwork_version
     where series_id = ? and paperwork_id = ? and number = ?`,
    [seriesId, paperworkId, paperworkNumber],
  );
  const read = readPaperworkDocument(row?.document);
  return read.ok ? read.value : null;
};

/** Gathers the file; the caller has asked the permission. */
export const getInspectionFile = async (
  em: EntityManager,
  inspection: Inspection,
): Promise<InspectionFile> => {
  const { seriesId, id } = inspection;
  const entry = await em.findOneOrFail(Entry, { seriesId, id: inspection.entryId });
  const event = await em.findOneOrFail(Event, { seriesId, id: inspection.eventId });
  const raceClass = await em.findOneOrFail(RaceClass, { seriesId, id: entry.classId });
  const { inspectorId } = inspection;
  const inspector = inspectorId ? await em.findOneOrFail(Person, { id: inspectorId }) : null;
  const gauges = await em.find(GaugeRow, { seriesId }, { orderBy: { code: 'asc' } });
  const standings = await readStandings(em, seriesId, inspection.eventId);
  return {
    inspection,
    entry,
    event,
    className: raceClass.name,
    inspector: inspector?.name ?? null,
    rules: await getRules(em, seriesId, inspection.rulesHash),
    gauges: gauges.map((row) => ({ ...registered(row), ...standings.get(row.id) })),
    rows: await readRows(em, seriesId, id),
    paperwork: await findPaperwork(em, inspection),
    chain: await readChain(em, seriesId, id),
  };
};
