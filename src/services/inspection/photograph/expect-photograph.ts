import type { Actor } from '@/domain/access/permission';
import { absent, type Failure, failure } from '@/domain/failure';
import { MOST_BYTES, tooLargeWords } from '@/domain/paperwork/file/limits';
import { fail, ok, type Result } from '@/domain/result';
import { KeptFile } from '@/entities/paperwork/file';
import { performAct } from '../../act/perform-act';
import { sweptAt } from '../../file/sweep-upload';
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
): Promise<
  Result<{ readonly fileId: string; readonly url: string; readonly type: string }, Failure>
> => {
  const { act, inspectionId, fileId, item, name, bytes } = input;
  const inspection = await findInspectionRow(deps.db, actor, 'inspection.record', inspectionId);
  if (inspection === null || !worksOn(actor, inspection)) return fail(absent());
  if (bytes > MOST_BYTES.photograph) {
    const detail = tooLargeWords('photograph', bytes);
    return fail(failure('too-large', detail, [{ pointer: '/bytes', detail }]));
  }
  const { seriesId } = inspection;
  const type = input.type.trim() === '' ? 'application/octet-stream' : input.type.trim();
  const uploadKey = `uploads/${seriesId}/${fileId}`;
  const expected = await performAct(
    deps,
    actor,
    {
      id: act,
      kind: 'expect-photograph',
      seriesId,
      input: { inspectionId, fileId, item, name, type, bytes },
    },
    async ({ em, at, send }) => {
      em.persist(
        em.create(KeptFile, {
          seriesId,
          id: fileId,
          inspectionId,
          purpose: 'finding',
          item,
          name,
          declaredType: type,
          declaredBytes: bytes,
          uploadKey,
          state: 'expected',
          createdBy: actor.personId,
          createdAt: at,
        }),
      );
      send('sweep-uploads', { seriesId, fileId }, sweptAt(at));
      return ok({ fileId });
    },
  );
  if (!expected.ok) return expected;
  return ok({ fileId, url: await deps.objects.presignPut(uploadKey, type, bytes), type });
};
