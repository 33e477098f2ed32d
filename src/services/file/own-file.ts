import type { EntityManager } from '@mikro-orm/postgresql';
import { LockMode } from '@mikro-orm/postgresql';
import { type Actor, may, seriesWhere } from '@/domain/access/permission';
import { KeptFile } from '@/entities/paperwork/file';
import { Paperwork } from '@/entities/paperwork/paperwork';
import { isId } from '../paperwork/own-paperwork';

export interface FileInPaperwork {
  readonly file: KeptFile;
  readonly paperwork: Paperwork;
}

/** A file of the actor's own paperwork; nothing for anybody else's. */
export const findOwnFile = async (
  em: EntityManager,
  actor: Actor,
  fileId: string,
  lock = false,
): Promise<FileInPaperwork | undefined> => {
  const open = seriesWhere(actor, 'paperwork.hand-in');
  if (!isId(fileId) || open.length === 0) return undefined;
  const options = lock ? { lockMode: LockMode.PESSIMISTIC_WRITE } : {};
  const file = await em.findOne(
    KeptFile,
    { id: fileId, seriesId: { $in: [...open] }, paperworkId: { $ne: null } },
    options,
  );
  if (file === null || file.paperworkId === null) return undefined;
  const paperwork = await em.findOne(Paperwork, {
    seriesId: file.seriesId,
    id: file.paperworkId ?? '',
    competitorId: actor.personId,
  });
  return paperwork === null ? undefined : { file, paperwork };
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
  // A draft is its owner's alone: officials see what some version that was handed in holds.
  const [held] = await em.execute<{ n: number }[]>(
    `select 1 as n from record.paperwork_version
     where series_id = ? and paperwork_id = ? and position(? in document) > 0 limit 1`,
    [file.seriesId, file.paperworkId, file.id],
  );
  return held === undefined ? undefined : file;
};
