import type { Actor } from '@/domain/access/permission';
import { absent, type Failure } from '@/domain/failure';
import { isId } from '@/domain/is-id';
import { MOST_BYTES, tooLargeWords } from '@/domain/paperwork/file/limits';
import { fail, type Result } from '@/domain/result';
import { KeptFile } from '@/entities/paperwork/file';
import { inspectFile } from '../../file/content/inspect-file';
import { keepSent } from '../../file/keep-sent';
import type { KeepDeps, KeptAnswer } from '../../file/settle-file';
import { findInspectionRow, worksOn } from '../read/find-inspection';

/** After the bytes of a bay photograph were sent: it is kept, or refused by what it is. */
export const confirmPhotograph = async (
  deps: KeepDeps,
  actor: Actor,
  input: { readonly act: string; readonly inspectionId: string; readonly fileId: string },
): Promise<Result<KeptAnswer, Failure>> => {
  const { act, inspectionId, fileId } = input;
  const inspection = await findInspectionRow(deps.db, actor, 'inspection.record', inspectionId);
  if (inspection === null || !worksOn(actor, inspection) || !isId(fileId)) return fail(absent());
  const { seriesId } = inspection;
  const file = await deps.db.findOne(KeptFile, { seriesId, id: fileId, inspectionId });
  if (file === null) return fail(absent());
  return keepSent(deps, actor, act, file, {
    kind: 'keep-photograph',
    most: MOST_BYTES.photograph,
    tooLarge: (bytes) => tooLargeWords('photograph', bytes),
    inspect: (bytes) => inspectFile(deps.images, 'photograph', bytes),
  });
};
