import { LockMode } from '@mikro-orm/core';
import type { Actor } from '@/domain/access/permission';
import { absent, type Failure, failure } from '@/domain/failure';
import { sha256, toHex } from '@/domain/ledger/bytes';
import { MOST_BYTES, tooLargeWords } from '@/domain/paperwork/file/limits';
import { fail, ok, type Result } from '@/domain/result';
import { KeptFile } from '@/entities/paperwork/file';
import { performAct } from '../../act/perform-act';
import { holdObject } from '../../file/hold-object';
import { inspectFile } from '../../file/inspect-file';
import { answered, type KeepDeps, type KeptAnswer } from '../../file/keep-file';
import { isId } from '../../paperwork/own-paperwork';
import { findInspectionRow, worksOn } from '../read/find-inspection';

/**
 * After the bytes were sent: they are read back from the store, and kept under their hash or refused
 * by what they are. Asked again, it gives the same answer.
 */
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
  const before = answered(file);
  if (before !== undefined) return ok(before);
  const { uploadKey, declaredBytes, name } = file;
  const head = await deps.objects.findHead(uploadKey);
  if (head === undefined)
    return fail(failure('not-in-this-state', `Nothing of ${name} has arrived yet. Send it again.`));
  const tooLarge = head.bytes > MOST_BYTES.photograph;
  const bytes = tooLarge
    ? new Uint8Array()
    : await deps.objects.read(uploadKey, MOST_BYTES.photograph);
  const facts = tooLarge
    ? fail(failure('too-large', tooLargeWords('photograph', head.bytes)))
    : await inspectFile(deps.images, 'photograph', bytes);
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
    { id: act, kind: 'keep-photograph', seriesId, input: { fileId, sha256: toHex(hash) } },
    async ({ em, at, send }) => {
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
      send('make-previews', { seriesId, fileId });
      const answer = { sha256: toHex(hash), bytes: bytes.length, type, keptAt: at.toISOString() };
      return ok<KeptAnswer>({ fileId, state: 'kept', ...answer });
    },
  );
  if (kept.ok) await deps.objects.remove(uploadKey);
  return kept;
};
