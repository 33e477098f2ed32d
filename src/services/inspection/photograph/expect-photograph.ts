import type { Actor } from '@/domain/access/permission';
import { absent, type Failure } from '@/domain/failure';
import { MOST_BYTES, tooLargeWords } from '@/domain/paperwork/file/limits';
import { fail, ok, type Result } from '@/domain/result';
import { addressWhole, type UploadAddress } from '../../file/upload/address-upload';
import { announcedType, announceFile, tooManyBytes } from '../../file/upload/announce-file';
import type { Ports } from '../../ports';
import { findInspectionRow, worksOn } from '../read/find-inspection';

/** Announces a photograph taken in the bay and answers where its bytes go. */
export const expectPhotograph = async (
  deps: Pick<Ports, 'db' | 'clock' | 'random' | 'jobs' | 'objects'>,
  actor: Actor,
  input: {
    readonly act: string;
    readonly inspectionId: string;
    readonly fileId: string;
    readonly item: string;
    readonly name: string;
    readonly type: string;
    readonly bytes: number;
  },
): Promise<Result<UploadAddress, Failure>> => {
  const { act, inspectionId, fileId, item, name, bytes } = input;
  const inspection = await findInspectionRow(deps.db, actor, 'inspection.record', inspectionId);
  if (inspection === null || !worksOn(actor, inspection)) return fail(absent());
  if (bytes > MOST_BYTES.photograph) return fail(tooManyBytes(tooLargeWords('photograph', bytes)));
  const type = announcedType(input.type);
  const announced = await announceFile(
    deps,
    actor,
    {
      act,
      kind: 'expect-photograph',
      seriesId: inspection.seriesId,
      input: { inspectionId, fileId, item, name, type, bytes },
    },
    {
      id: fileId,
      inspectionId,
      purpose: 'finding',
      item,
      name,
      declaredType: type,
      declaredBytes: bytes,
    },
  );
  return announced.ok ? ok(await addressWhole(deps, announced.value)) : announced;
};
