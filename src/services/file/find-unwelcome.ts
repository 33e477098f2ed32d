import type { EntityManager } from '@mikro-orm/postgresql';
import type { Need } from '@/domain/access/paperwork-access';
import type { Actor } from '@/domain/access/permission';
import { absent, type Failure, failure } from '@/domain/failure';
import { isWritable } from '@/domain/paperwork/state';
import type { KeptFile } from '@/entities/paperwork/file';
import { findOwnPaperwork } from '../paperwork/own-paperwork';

/** Whether it is the photograph of an engine swap. */
export const isOfSwap = async (
  em: EntityManager,
  seriesId: string,
  fileId: string,
): Promise<boolean> => {
  const [row] = await em.execute<{ n: number }[]>(
    'select 1 as n from record.engine_swap where series_id = ? and photograph_id = ? limit 1',
    [seriesId, fileId],
  );
  return row !== undefined;
};

/** What one must be let to do, to add or take out such a file. */
export const needFor = (purpose: KeptFile['purpose']): Need =>
  purpose === 'sheet' ? 'sheets' : 'answers';

export const wrongPlace = (): Failure =>
  failure('not-in-this-state', 'This paperwork is handed in; files are added to a draft.');

/**
 * Why such a file may not come to this paperwork; nothing where it may: to a draft, or as the photograph
 * of an engine swap. The paperwork's row stays locked.
 */
export const findUnwelcome = async (
  em: EntityManager,
  actor: Actor,
  file: {
    readonly paperworkId: string;
    readonly fileId: string;
    readonly purpose: KeptFile['purpose'];
  },
): Promise<Failure | undefined> => {
  const { paperworkId, fileId, purpose } = file;
  const paperwork = await findOwnPaperwork(em, actor, paperworkId, true, needFor(purpose));
  if (paperwork === undefined) return absent();
  const { state, seriesId } = paperwork;
  return isWritable(state) || (await isOfSwap(em, seriesId, fileId)) ? undefined : wrongPlace();
};
