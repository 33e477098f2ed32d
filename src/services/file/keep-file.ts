import { LockMode } from '@mikro-orm/postgresql';
import type { Actor } from '@/domain/access/permission';
import { absent, type Failure } from '@/domain/failure';
import { sha256, toHex } from '@/domain/ledger/bytes';
import type { FilePurpose } from '@/domain/paperwork/file/limits';
import { fail, ok, type Result } from '@/domain/result';
import { KeptFile } from '@/entities/paperwork/file';
import { performAct } from '../act/perform-act';
import { findOwnPaperwork, isId } from '../paperwork/own-paperwork';
import type { Ports } from '../ports';
import { wrongPlace } from './expect-upload';
import { holdObject } from './hold-object';
import { inspectFile } from './inspect-file';
import { needFor, takesFile } from './own-file';

export interface FileToKeep {
  readonly act: string;
  readonly fileId: string;
  readonly paperworkId: string;
  readonly purpose: FilePurpose;
  readonly item: string;
  readonly name: string;
  readonly declaredType: string;
  /** What was announced; the bytes' own length where nothing was. */
  readonly declaredBytes: number;
  readonly bytes: Uint8Array;
}

export type KeptAnswer =
  | {
      readonly fileId: string;
      readonly state: 'kept';
      readonly sha256: string;
      readonly bytes: number;
      readonly type: string;
      readonly keptAt: string;
    }
  | { readonly fileId: string; readonly state: 'refused'; readonly refusedBecause: string };

export type KeepDeps = Pick<Ports, 'db' | 'clock' | 'random' | 'jobs' | 'objects' | 'images'>;

/** The answer that a file carries already; nothing while it is only expected. */
export const answered = (file: KeptFile): KeptAnswer | undefined => {
  const { id: fileId, state, sha256, bytes, mediaType, keptAt, refusedBecause } = file;
  if (state === 'refused') return { fileId, state, refusedBecause: refusedBecause ?? '' };
  if (state !== 'kept' || !sha256 || !bytes || !mediaType || !keptAt) return undefined;
  const hex = Buffer.from(sha256).toString('hex');
  return { fileId, state, sha256: hex, bytes, type: mediaType, keptAt: keptAt.toISOString() };
};

/**
 * Reads, sizes and hashes the bytes; a file that is what it must be is kept byte for byte under its
 * hash, another is refused with the reason, and either way the answer stays.
 */
export const keepFile = async (
  deps: KeepDeps,
  actor: Actor,
  input: FileToKeep,
): Promise<Result<KeptAnswer, Failure>> => {
  const { act, fileId, paperworkId, purpose, item, name, declaredType, declaredBytes } = input;
  const { bytes } = input;
  const need = needFor(purpose);
  const known = isId(paperworkId)
    ? await findOwnPaperwork(deps.db, actor, paperworkId, false, need)
    : undefined;
  if (known === undefined) return fail(absent());
  const { seriesId } = known;
  const hash = sha256(bytes);
  const facts = await inspectFile(deps.images, purpose, bytes);
  const wrongSize =
    bytes.length === declaredBytes
      ? undefined
      : `${declaredBytes} bytes were announced and ${bytes.length} arrived. Send the file again.`;
  const refused = wrongSize ?? (facts.ok ? undefined : facts.failure.detail);
  const objectKey = `originals/${toHex(hash)}`;
  // Under its own hash the same bytes may be written twice and stay the same.
  if (refused === undefined && facts.ok)
    await deps.objects.write(objectKey, bytes, facts.value.type);
  const request = { fileId, paperworkId, purpose, item, name, sha256: toHex(hash) };
  return performAct(
    deps,
    actor,
    { id: act, kind: 'keep-file', seriesId, input: request },
    async ({ em, at, send }) => {
      const paperwork = await findOwnPaperwork(em, actor, paperworkId, true, need);
      if (paperwork === undefined) return fail(absent());
      if (!(await takesFile(em, paperwork, fileId))) return fail(wrongPlace());
      const row =
        (await em.findOne(
          KeptFile,
          { seriesId, id: fileId, paperworkId },
          { lockMode: LockMode.PESSIMISTIC_WRITE },
        )) ??
        em.create(KeptFile, {
          seriesId,
          id: fileId,
          paperworkId,
          purpose,
          item,
          name,
          declaredType,
          declaredBytes: Math.max(1, declaredBytes),
          uploadKey: '',
          state: 'expected',
          createdBy: actor.personId,
          createdAt: at,
        });
      const before = answered(row);
      if (before !== undefined) return ok(before);
      em.persist(row);
      if (refused !== undefined || !facts.ok) {
        const refusedBecause = refused ?? '';
        Object.assign(row, { state: 'refused', refusedBecause });
        return ok<KeptAnswer>({ fileId, state: 'refused', refusedBecause });
      }
      const { type, width, height } = facts.value;
      await holdObject(deps, em, { hash: toHex(hash), key: objectKey, bytes, type });
      Object.assign(row, { state: 'kept', objectKey, mediaType: type, bytes: bytes.length });
      Object.assign(row, { sha256: Buffer.from(hash), width, height, keptAt: at });
      if (purpose === 'photograph') send('make-previews', { seriesId, fileId });
      const kept = { sha256: toHex(hash), bytes: bytes.length, type, keptAt: at.toISOString() };
      return ok<KeptAnswer>({ fileId, state: 'kept', ...kept });
    },
  );
};
