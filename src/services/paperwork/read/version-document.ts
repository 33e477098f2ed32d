import type { EntityManager } from '@mikro-orm/postgresql';
import { readPaperworkDocument } from '@/contracts/paperwork/document';
import type { PaperworkDocument } from '@/domain/paperwork/document';

/** A version as it was handed in; a stored one that cannot be read is a defect. */
export const getVersionDocument = async (
  em: EntityManager,
  seriesId: string,
  paperworkId: string,
  number: number,
): Promise<PaperworkDocument> => {
  const [stored] = await em.execute<{ document: unknown }[]>(
    `select document::jsonb as document from record.paperwork_version
     where series_id = ? and paperwork_id = ? and number = ?`,
    [seriesId, paperworkId, number],
  );
  const read = readPaperworkDocument(stored?.document);
  if (!read.ok) throw new Error(`Version ${number} of ${paperworkId}: ${read.failure.detail}`);
  return read.value;
};
