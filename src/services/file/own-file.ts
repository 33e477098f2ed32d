import type { EntityManager } from '@mikro-orm/postgresql';
import { LockMode } from '@mikro-orm/postgresql';
import { openings } from '@/domain/access/paperwork-access';
import { type Actor, may, seriesWhere } from '@/domain/access/permission';
import { isId } from '@/domain/is-id';
import { KeptFile } from '@/entities/paperwork/file';
import type { Paperwork } from '@/entities/paperwork/paperwork';
import { findOwnPaperwork } from '../paperwork/own-paperwork';
import { isOfSwap, needFor } from './find-unwelcome';

export interface FileInPaperwork {
  readonly file: KeptFile;
  readonly paperwork: Paperwork;
}

/**
 * A file of paperwork that is the actor's own or open to them; nothing for anybody else's. To look at it
 * (no lock) is one right, to change it another, by what the file is.
 */
export const findOwnFile = async (
  em: EntityManager,
  actor: Actor,
  fileId: string,
  lock = false,
): Promise<FileInPaperwork | undefined> => {
  if (!isId(fileId)) return undefined;
  const series = openings(actor, 'see').flatMap(({ seriesIds }) => seriesIds);
  if (series.length === 0) return undefined;
  const options = lock ? { lockMode: LockMode.PESSIMISTIC_WRITE } : {};
  const file = await em.findOne(
    KeptFile,
    { id: fileId, seriesId: { $in: series }, paperworkId: { $ne: null } },
    options,
  );
  if (!file?.paperworkId) return undefined;
  const need = lock ? needFor(file.purpose) : 'see';
  const paperwork = await findOwnPaperwork(em, actor, file.paperworkId, false, need);
  return paperwork === undefined ? undefined : { file, paperwork };
};

/**
 * A file that the actor may look at: of their own paperwork, or of paperwork that was handed in to a
 * series whose paperwork they decide, or that they inspect.
 */
export const findReadableFile = async (
  em: EntityManager,
  actor: Actor,
  fileId: string,
): Promise<KeptFile | undefined> => {
  if (!isId(fileId)) return undefined;
  const own = await findOwnFile(em, actor, fileId);
  if (own !== undefined) return own.file;
  const open = [
    ...seriesWhere(actor, 'paperwork.decide'),
    ...seriesWhere(actor, 'inspection.read'),
  ];
  if (open.length === 0) return undefined;
  const file = await em.findOne(KeptFile, { id: fileId, seriesId: { $in: open } });
  if (file === null) return undefined;
  if (!file.paperworkId) return may(actor, 'inspection.read', file.seriesId) ? file : undefined;
  // A draft is its owner's alone: officials see what some version that was handed in holds, and swaps.
  const [held] = await em.execute<{ n: number }[]>(
    `select 1 as n from record.paperwork_version
     where series_id = ? and paperwork_id = ? and position(? in document) > 0 limit 1`,
    [file.seriesId, file.paperworkId, file.id],
  );
  return held !== undefined || (await isOfSwap(em, file.seriesId, file.id)) ? file : undefined;
};
