import { LockMode } from '@mikro-orm/postgresql';
import type { Actor } from '@/domain/access/permission';
import { absent, type Failure } from '@/domain/failure';
import { isId } from '@/domain/is-id';
import { toHex } from '@/domain/ledger/bytes';
import type { FilePurpose } from '@/domain/paperwork/file/limits';
import { fail, ok, type Result } from '@/domain/result';
import { KeptFile } from '@/entities/paperwork/file';
import { performAct } from '../act/perform-act';
import { findOwnPaperwork } from '../paperwork/own-paperwork';
import { inspectFile } from './content/inspect-file';
import { judgeBytes } from './content/judge-bytes';
import { findUnwelcome, needFor } from './find-unwelcome';
import { type KeepDeps, type KeptAnswer, settleFile } from './settle-file';

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

/** Keeps or refuses a paperwork's file by its bytes; it need not have been announced. */
export const keepFile = async (
  deps: KeepDeps,
  actor: Actor,
  input: FileToKeep,
): Promise<Result<KeptAnswer, Failure>> => {
  const { act, fileId, paperworkId, purpose, item, name, declaredType, declaredBytes } = input;
  const known = isId(paperworkId)
    ? await findOwnPaperwork(deps.db, actor, paperworkId, false, needFor(purpose))
    : undefined;
  if (known === undefined) return fail(absent());
  const { seriesId } = known;
  const judged = await judgeBytes(input.bytes, declaredBytes, (bytes) =>
    inspectFile(deps.images, purpose, bytes),
  );
  const request = { fileId, paperworkId, purpose, item, name, sha256: toHex(judged.hash) };
  return performAct(
    deps,
    actor,
    { id: act, kind: 'keep-file', seriesId, input: request },
    async (doing) => {
      const { em, at } = doing;
      const unwelcome = await findUnwelcome(em, actor, { paperworkId, fileId, purpose });
      if (unwelcome !== undefined) return fail(unwelcome);
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
      em.persist(row);
      return ok(await settleFile(deps, doing, row, judged));
    },
  );
};
