import { type Actor, may } from '@/domain/access/permission';
import { absent, type Failure, failure } from '@/domain/failure';
import { sizeWords } from '@/domain/paperwork/file/limits';
import { fail, ok, type Result } from '@/domain/result';
import { GaugeRow } from '@/entities/event/gauge';
import { KeptFile } from '@/entities/paperwork/file';
import { performAct } from '../../act/perform-act';
import { sweptAt } from '../../file/sweep-upload';
import { isId } from '../../paperwork/own-paperwork';
import type { Ports } from '../../ports';

export const MOST_CERTIFICATE_BYTES = 10_000_000;

export const tooLargeCertificate = (bytes: number): string =>
  `This certificate has ${sizeWords(bytes)}; at most ${sizeWords(MOST_CERTIFICATE_BYTES)} are taken.`;

/** Announces the file of a gauge's certificate and answers where its bytes go. */
export const expectCertificate = async (
  deps: Pick<Ports, 'db' | 'clock' | 'random' | 'jobs' | 'objects'>,
  actor: Actor,
  input: {
    readonly act: string;
    readonly seriesId: string;
    readonly gaugeId: string;
    readonly fileId: string;
    readonly name: string;
    readonly type: string;
    readonly bytes: number;
  },
): Promise<
  Result<{ readonly fileId: string; readonly url: string; readonly type: string }, Failure>
> => {
  const { act, seriesId, gaugeId, fileId, name, bytes } = input;
  if (!may(actor, 'gauge.manage', seriesId) || !isId(gaugeId)) return fail(absent());
  if (bytes > MOST_CERTIFICATE_BYTES) {
    const detail = tooLargeCertificate(bytes);
    return fail(failure('too-large', detail, [{ pointer: '/bytes', detail }]));
  }
  const type = input.type.trim() === '' ? 'application/octet-stream' : input.type.trim();
  const uploadKey = `uploads/${seriesId}/${fileId}`;
  const expected = await performAct(
    deps,
    actor,
    {
      id: act,
      kind: 'expect-certificate',
      seriesId,
      input: { gaugeId, fileId, name, type, bytes },
    },
    async ({ em, at, send }) => {
      if ((await em.findOne(GaugeRow, { seriesId, id: gaugeId })) === null) return fail(absent());
      em.persist(
        em.create(KeptFile, {
          seriesId,
          id: fileId,
          gaugeId,
          purpose: 'certificate',
          item: gaugeId,
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
