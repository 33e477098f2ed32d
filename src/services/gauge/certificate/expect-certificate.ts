import { type Actor, may } from '@/domain/access/permission';
import { absent, type Failure } from '@/domain/failure';
import { isId } from '@/domain/is-id';
import { sizeWords } from '@/domain/paperwork/file/limits';
import { fail, ok, type Result } from '@/domain/result';
import { GaugeRow } from '@/entities/event/gauge';
import { addressWhole, type UploadAddress } from '../../file/upload/address-upload';
import { announcedType, announceFile, tooManyBytes } from '../../file/upload/announce-file';
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
): Promise<Result<UploadAddress, Failure>> => {
  const { act, seriesId, gaugeId, fileId, name, bytes } = input;
  if (!may(actor, 'gauge.manage', seriesId) || !isId(gaugeId)) return fail(absent());
  if (bytes > MOST_CERTIFICATE_BYTES) return fail(tooManyBytes(tooLargeCertificate(bytes)));
  const type = announcedType(input.type);
  const announced = await announceFile(
    deps,
    actor,
    {
      act,
      kind: 'expect-certificate',
      seriesId,
      input: { gaugeId, fileId, name, type, bytes },
    },
    {
      id: fileId,
      gaugeId,
      purpose: 'certificate',
      item: gaugeId,
      name,
      declaredType: type,
      declaredBytes: bytes,
    },
    {
      any: async (em) =>
        (await em.findOne(GaugeRow, { seriesId, id: gaugeId })) === null ? absent() : undefined,
    },
  );
  return announced.ok ? ok(await addressWhole(deps, announced.value)) : announced;
};
