import { LockMode } from '@mikro-orm/postgresql';
import type { Actor } from '@/domain/access/permission';
import { type Failure, failure } from '@/domain/failure';
import { toHex } from '@/domain/ledger/bytes';
import { fail, ok, type Result } from '@/domain/result';
import { KeptFile } from '@/entities/paperwork/file';
import { performAct } from '../act/perform-act';
import type { FileFacts } from './content/file-facts';
import { judgeBytes, unread } from './content/judge-bytes';
import { answered, type KeepDeps, type KeptAnswer, settleFile } from './settle-file';

/** How a file of one kind is taken. */
export interface Taking {
  /** The act's lasting name. */
  readonly kind: string;
  readonly most: number;
  readonly tooLarge: (bytes: number) => string;
  readonly inspect: (bytes: Uint8Array) => Promise<Result<FileFacts, Failure>>;
}

/**
 * After the bytes of an announced file were sent whole: they are read back from the store, and kept under
 * their hash or refused by what they are. Asked again, it gives the same answer.
 */
export const keepSent = async (
  deps: KeepDeps,
  actor: Actor,
  act: string,
  file: KeptFile,
  { kind, most, tooLarge, inspect }: Taking,
): Promise<Result<KeptAnswer, Failure>> => {
  const before = answered(file);
  if (before !== undefined) return ok(before);
  const { seriesId, id: fileId, uploadKey, declaredBytes, name } = file;
  const head = await deps.objects.findHead(uploadKey);
  if (head === undefined)
    return fail(failure('not-in-this-state', `Nothing of ${name} has arrived yet. Send it again.`));
  const judged =
    head.bytes > most
      ? unread(failure('too-large', tooLarge(head.bytes)))
      : await judgeBytes(await deps.objects.read(uploadKey, most), declaredBytes, inspect);
  const kept = await performAct(
    deps,
    actor,
    { id: act, kind, seriesId, input: { fileId, sha256: toHex(judged.hash) } },
    async (doing) => {
      const lock = { lockMode: LockMode.PESSIMISTIC_WRITE };
      const row = await doing.em.findOneOrFail(KeptFile, { seriesId, id: fileId }, lock);
      return ok(await settleFile(deps, doing, row, judged));
    },
  );
  // The original stands under its hash by now; what was sent is scratch.
  if (kept.ok) await deps.objects.remove(uploadKey);
  return kept;
};
