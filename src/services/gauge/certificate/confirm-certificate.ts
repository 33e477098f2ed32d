import { type Actor, may } from '@/domain/access/permission';
import { absent, type Failure } from '@/domain/failure';
import { isId } from '@/domain/is-id';
import { sniff } from '@/domain/paperwork/file/sniff';
import { fail, ok, type Result } from '@/domain/result';
import { KeptFile } from '@/entities/paperwork/file';
import type { FileFacts } from '../../file/content/file-facts';
import { inspectFile } from '../../file/content/inspect-file';
import { keepSent } from '../../file/keep-sent';
import type { KeepDeps, KeptAnswer } from '../../file/settle-file';
import { MOST_CERTIFICATE_BYTES, tooLargeCertificate } from './expect-certificate';

/** A PDF or a photograph, by its content. */
const inspectCertificate = async (
  { images }: Pick<KeepDeps, 'images'>,
  bytes: Uint8Array,
): Promise<Result<FileFacts, Failure>> =>
  sniff(bytes) === 'pdf'
    ? ok({ type: 'application/pdf', width: null, height: null })
    : inspectFile(images, 'photograph', bytes);

/**
 * After the bytes of a certificate's file were sent: it is kept, or refused by what it is. The register
 * names the file once the gauge is saved with it.
 */
export const confirmCertificate = async (
  deps: KeepDeps,
  actor: Actor,
  input: {
    readonly act: string;
    readonly seriesId: string;
    readonly gaugeId: string;
    readonly fileId: string;
  },
): Promise<Result<KeptAnswer, Failure>> => {
  const { act, seriesId, gaugeId, fileId } = input;
  if (!may(actor, 'gauge.manage', seriesId) || !isId(gaugeId) || !isId(fileId))
    return fail(absent());
  const file = await deps.db.findOne(KeptFile, { seriesId, id: fileId, gaugeId });
  if (file === null) return fail(absent());
  return keepSent(deps, actor, act, file, {
    kind: 'keep-certificate',
    most: MOST_CERTIFICATE_BYTES,
    tooLarge: tooLargeCertificate,
    inspect: (bytes) => inspectCertificate(deps, bytes),
  });
};
