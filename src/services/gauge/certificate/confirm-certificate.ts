import { LockMode } from '@mikro-orm/core';
import { type Actor, may } from '@/domain/access/permission';
import { absent, type Failure, failure } from '@/domain/failure';
import { sha256, toHex } from '@/domain/ledger/bytes';
import { sniff } from '@/domain/paperwork/file/sniff';
import { fail, ok, type Result } from '@/domain/result';
import { KeptFile } from '@/entities/paperwork/file';
import { performAct } from '../../act/perform-act';
import { holdObject } from '../../file/hold-object';
import { inspectFile } from '../../file/inspect-file';
import { answered, type KeepDeps, type KeptAnswer } from '../../file/keep-file';
import { isId } from '../../paperwork/own-paperwork';
import { MOST_CERTIFICATE_BYTES, tooLargeCertificate } from './expect-certificate';

/** A PDF or a photograph, by its content. */
const inspectCertificate = async (
  deps: KeepDeps,
  bytes: Uint8Array,
): ReturnType<typeof inspectFile> =>
  sniff(bytes) === 'pdf'
    ? ok({ type: 'application/pdf', width: null, height: null })
    : inspectFile(deps.images, 'photograph', bytes);

/**
 * After the bytes were sent: they are read back, and kept under their hash or refused by what they
 * are. The register names the file once the gauge is saved with it.
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
  const before = answered(file);
  if (before !== undefined) return ok(before);
  const { uploadKey, declaredBytes, name } = file;
  const head = await deps.objects.findHead(uploadKey);
  if (head === undefined)
    return fail(failure('not-in-this-state', `Nothing of ${name} has arrived yet. Send it again.`));
  const tooLarge = head.bytes > MOST_CERTIFICATE_BYTES;
  const bytes = tooLarge
    ? new Uint8Array()
    : await deps.objects.read(uploadKey, MOST_CERTIFICATE_BYTES);
  const facts = tooLarge
    ? fail(failure('too-large', tooLargeCertificate(head.bytes)))
    : await inspectCertificate(deps, bytes);
  const wrongSize =
    head.bytes === declaredBytes
      ? undefined
      : `${declaredBytes} bytes were announced and ${head.bytes} arrived. Send the file again.`;
  const refused = wrongSize ?? (facts.ok ? undefined : facts.failure.detail);
  const hash = sha256(bytes);
  const objectKey = `originals/${toHex(hash)}`;
  const kept = await performAct(
    deps,
    actor,
    { id: act, kind: 'keep-certificate', seriesId, input: { fileId, sha256: toHex(hash) } },
    async ({ em, at }) => {
      const row = await em.findOneOrFail(
        KeptFile,
        { seriesId, id: fileId },
        { lockMode: LockMode.PESSIMISTIC_WRITE },
      );
      const known = answered(row);
      if (known !== undefined) return ok(known);
      if (refused !== undefined || !facts.ok) {
        const refusedBecause = refused ?? '';
        Object.assign(row, { state: 'refused', refusedBecause });
        return ok<KeptAnswer>({ fileId, state: 'refused', refusedBecause });
      }
      const { type, width, height } = facts.value;
      await holdObject(deps, em, { hash: toHex(hash), key: objectKey, bytes, type });
      Object.assign(row, { state: 'kept', objectKey, mediaType: type, bytes: bytes.length });
      Object.assign(row, { sha256: Buffer.from(hash), width, height, keptAt: at });
      const answer = { sha256: toHex(hash), bytes: bytes.length, type, keptAt: at.toISOString() };
      return ok<KeptAnswer>({ fileId, state: 'kept', ...answer });
    },
  );
  if (kept.ok) await deps.objects.remove(uploadKey);
  return kept;
};
