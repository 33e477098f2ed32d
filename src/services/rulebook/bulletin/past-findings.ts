import type { EntityManager } from '@mikro-orm/postgresql';
import type { PastCase } from '@/domain/rulebook/trial/try-rules';
import { Inspection } from '@/entities/event/inspection';
import { assessFile } from '../../inspection/read/assess-file';
import { getInspectionFile } from '../../inspection/read/inspection-file';

/** As many as an official waits for; the newest count most. */
const MOST = 60;

/** What was found in the last closed inspections of these classes, as facts for a trial of rules. */
export const readPastFindings = async (
  em: EntityManager,
  seriesId: string,
  classIds: readonly string[],
): Promise<readonly PastCase[]> => {
  const rows = await em.execute<{ id: string }[]>(
    `select i.id from public.inspection i
     join public.entry e on e.series_id = i.series_id and e.id = i.entry_id
     where i.series_id = ? and e.class_id = any(?::uuid[]) and i.closed_at is not null
     order by i.closed_at desc limit ${MOST}`,
    [seriesId, `{${classIds.join(',')}}`],
  );
  const cases: PastCase[] = [];
  for (const { id } of rows) {
    const inspection = await em.findOneOrFail(Inspection, { seriesId, id });
    const file = await getInspectionFile(em, inspection);
    const { engine } = file.paperwork ?? {};
    cases.push({
      id,
      name: `Car ${file.entry.carNumber}, event ${file.event.number}`,
      bearer: { carNumber: file.entry.carNumber, engineId: engine?.id },
      facts: assessFile(file).facts,
    });
  }
  return cases;
};
