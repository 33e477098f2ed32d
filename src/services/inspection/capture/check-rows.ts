import type { EntityManager } from '@mikro-orm/postgresql';
import type { SentRow } from '@/contracts/inspection/rows';
import type { Fault } from '@/domain/failure';
import { findWeakness } from '@/domain/inspection/capture/gauge-record';
import { fromStored } from '@/domain/quantity/stored';
import { GaugeRow } from '@/entities/event/gauge';
import { registered } from '../read/inspection-file';

const unknownIds = async (
  em: EntityManager,
  query: string,
  keys: readonly string[],
  ids: readonly string[],
): Promise<ReadonlySet<string>> => {
  if (ids.length === 0) return new Set();
  const rows = await em.execute<{ id: string }[]>(
    query.replace('$ids', ids.map(() => '?').join(', ')),
    [...keys, ...ids],
  );
  const known = new Set(rows.map((row) => row.id));
  return new Set(ids.filter((id) => !known.has(id)));
};

/** What the database would refuse, said with the place instead: gauges, readings, files, repeated ids. */
export const rowFaults = async (
  em: EntityManager,
  { seriesId, inspectionId }: { readonly seriesId: string; readonly inspectionId: string },
  rows: readonly SentRow[],
): Promise<readonly Fault[]> => {
  const sent = new Set(rows.map((row) => row.id));
  const gauges = rows.flatMap((row) =>
    row.kind === 'reading' || row.kind === 'zero' ? [row.gaugeId] : [],
  );
  const rings = rows.flatMap((row) => (row.kind === 'zero' && row.ringId ? [row.ringId] : []));
  const pointed = rows.flatMap((row) =>
    'readingId' in row && !sent.has(row.readingId) ? [row.readingId] : [],
  );
  const pictures = rows.flatMap((row) =>
    row.kind === 'remark' && row.remark === 'photograph' ? [row.value] : [],
  );
  const noGauge = await unknownIds(
    em,
    'select id from public.gauge where series_id = ? and id in ($ids)',
    [seriesId],
    [...new Set([...gauges, ...rings])],
  );
  const noReading = await unknownIds(
    em,
    'select id from record.reading where series_id = ? and inspection_id = ? and id in ($ids)',
    [seriesId, inspectionId],
    pointed,
  );
  const noFile = await unknownIds(
    em,
    `select id from public.file where series_id = ? and inspection_id = ? and state = 'kept' and id in ($ids)`,
    [seriesId, inspectionId],
    pictures,
  );
  const kept = await keptIds(em, seriesId, [...sent]);
  return rows.flatMap((row, at): readonly Fault[] => {
    const say = (field: string, detail: string) => ({ pointer: `/rows/${at}/${field}`, detail });
    return [
      ...(kept.has(row.id) || rows.findIndex((one) => one.id === row.id) < at
        ? [say('id', 'A row of this identifier is kept already.')]
        : []),
      ...('gaugeId' in row && noGauge.has(row.gaugeId)
        ? [say('gaugeId', 'This gauge is not in the series’ register.')]
        : []),
      ...(row.kind === 'zero' && row.ringId !== undefined && noGauge.has(row.ringId)
        ? [say('ringId', 'This setting ring is not in the series’ register.')]
        : []),
      ...('readingId' in row && noReading.has(row.readingId)
        ? [say('readingId', 'This reading is not part of the inspection.')]
        : []),
      ...(row.kind === 'remark' && row.remark === 'photograph' && noFile.has(row.value)
        ? [say('value', 'This photograph has not arrived yet.')]
        : []),
    ];
  });
};

const keptIds = async (
  em: EntityManager,
  seriesId: string,
  ids: readonly string[],
): Promise<ReadonlySet<string>> => {
  const marks = ids.map(() => '?').join(', ');
  const rows = await em.execute<{ id: string }[]>(
    ['reading', 'zero', 'remark']
      .map((table) => `select id from record.${table} where series_id = ? and id in (${marks})`)
      .join(' union all '),
    Array.from({ length: 3 }, () => [seriesId, ...ids]).flat(),
  );
  return new Set(rows.map((row) => row.id));
};

/** Rows by a gauge that cannot support a breach: they are kept, count, and say so. */
export const marksOf = async (
  em: EntityManager,
  { seriesId, zone }: { readonly seriesId: string; readonly zone: string },
  rows: readonly SentRow[],
): Promise<ReadonlyMap<string, string>> => {
  const gauges = (await em.find(GaugeRow, { seriesId })).map(registered);
  const marks = new Map<string, string>();
  for (const row of rows) {
    if (row.kind === 'remark') continue;
    const gauge = gauges.find((one) => one.id === row.gaugeId);
    if (gauge === undefined) continue;
    const absolute = row.kind === 'reading' && row.method === 'absolute';
    const size =
      absolute && ['in', 'mm'].includes(row.value.unit)
        ? fromStored(row.value, 'length')
        : undefined;
    const weakness = findWeakness(gauge, { occurredAt: row.occurredAt, zone, size });
    if (weakness !== undefined) marks.set(row.id, weakness.words);
  }
  return marks;
};
