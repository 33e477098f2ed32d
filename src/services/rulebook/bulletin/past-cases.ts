import type { EntityManager } from '@mikro-orm/postgresql';
import { readPaperworkDocument } from '@/contracts/paperwork/document';
import { declaredFacts } from '@/domain/paperwork/declared-facts';
import type { PastCase } from '@/domain/rulebook/trial/try-rules';

export interface AcceptedEngine extends PastCase {
  readonly engineId: string;
  readonly carNumber: string;
  /** Who is told: the competitor and, where it is somebody else, the engine's owner. */
  readonly owners: readonly { readonly personId: string; readonly email: string }[];
}

interface Row {
  readonly id: string;
  readonly engine_id: string;
  readonly car_number: string;
  readonly document: unknown;
  readonly owners: AcceptedEngine['owners'];
}

/** The last accepted paperwork of every engine declared in these classes, as facts for a trial of rules. */
export const readAcceptedEngines = async (
  em: EntityManager,
  seriesId: string,
  classIds: readonly string[],
): Promise<readonly AcceptedEngine[]> => {
  const rows = await em.execute<Row[]>(
    `select p.id, p.engine_id, p.car_number, v.document::jsonb as document,
       (select jsonb_agg(jsonb_build_object('personId', o.id, 'email', o.email) order by o.id)
        from public.person o join public.engine e on e.id = p.engine_id
        where o.id in (p.competitor_id, e.owner_id)) as owners
     from public.paperwork p
     join lateral (
       select v.document from record.paperwork_version v
       join record.paperwork_decision d
         on d.series_id = v.series_id and d.paperwork_id = v.paperwork_id and d.number = v.number
       where v.series_id = p.series_id and v.paperwork_id = p.id and d.decision = 'accepted'
       order by v.number desc limit 1
     ) v on true
     where p.series_id = ? and p.class_id = any(?::uuid[]) and p.state <> 'withdrawn'
     order by p.car_number, p.id`,
    [seriesId, `{${classIds.join(',')}}`],
  );
  return rows.map((row) => {
    const document = readPaperworkDocument(row.document);
    if (!document.ok) throw new Error(`Paperwork ${row.id}: ${document.failure.detail}`);
    const { engine } = document.value;
    return {
      id: row.id,
      name: `Car ${row.car_number}, engine ${engine.reference}`,
      engineId: row.engine_id,
      carNumber: row.car_number,
      bearer: { carNumber: row.car_number, engineId: row.engine_id },
      facts: declaredFacts(document.value),
      owners: row.owners,
    };
  });
};
