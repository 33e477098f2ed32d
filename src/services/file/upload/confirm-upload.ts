import type { Actor } from '@/domain/access/permission';
import { absent, type Failure, failure } from '@/domain/failure';
import { type FilePurpose, MOST_BYTES, tooLargeWords } from '@/domain/paperwork/file/limits';
import { fail, ok, type Result } from '@/domain/result';
import type { KeptFile } from '@/entities/paperwork/file';
import { performAct } from '../../act/perform-act';
import type { ObjectHead, Ports, SentPart } from '../../ports';
import { keepFile } from '../keep-file';
import { findOwnFile } from '../own-file';
import { answered, type KeepDeps, type KeptAnswer, refuseFile } from '../settle-file';
import { withStore } from '../with-store';
import { takeTurns } from './take-turns';

// Each holds a whole file in memory.
const inTurn = takeTurns(3);

/** Refuses without reading what is larger than any file may be. */
const refuseUnread = (
  deps: KeepDeps,
  actor: Actor,
  act: string,
  file: KeptFile,
  refusedBecause: string,
): Promise<Result<KeptAnswer, Failure>> => {
  const { seriesId, id: fileId } = file;
  return performAct(
    deps,
    actor,
    { id: act, kind: 'refuse-file', seriesId, input: { fileId } },
    async ({ em }) => {
      const found = await findOwnFile(em, actor, fileId, true);
      if (found === undefined) return fail(absent());
      return ok(refuseFile(found.file, refusedBecause));
    },
  );
};

/** What arrived; of a file that went in parts, they are made one object first. Nothing where not all is there. */
const findArrived = async (
  { objects, uploads }: Pick<Ports, 'objects' | 'uploads'>,
  { uploadId, uploadKey }: KeptFile,
  parts: readonly SentPart[],
): Promise<ObjectHead | undefined> => {
  const there = await objects.findHead(uploadKey);
  if (there !== undefined || !uploadId || parts.length === 0) return there;
  return (await uploads.join(uploadKey, uploadId, parts)) ? objects.findHead(uploadKey) : undefined;
};

const notArrived = ({ name }: KeptFile): Failure =>
  failure('not-in-this-state', `Not all of ${name} has arrived yet. Send it again.`);

/**
 * After the bytes were sent: the server reads them back from the store and decides by them alone. Sent
 * again, it gives the same answer; before everything arrived it says so, and may be asked again.
 */
export const confirmUpload = async (
  deps: KeepDeps & Pick<Ports, 'uploads'>,
  actor: Actor,
  input: {
    readonly act: string;
    readonly fileId: string;
    /** What the store answered to each part, where the file went in parts. */
    readonly parts?: readonly SentPart[] | undefined;
  },
): Promise<Result<KeptAnswer, Failure>> => {
  const found = await findOwnFile(deps.db, actor, input.fileId);
  if (found === undefined) return fail(absent());
  const { file, paperwork } = found;
  const before = answered(file);
  if (before !== undefined) return ok(before);
  const { id: fileId, uploadKey, item, name, declaredType, declaredBytes } = file;
  const purpose = file.purpose as FilePurpose;
  const most = MOST_BYTES[purpose];
  return withStore(async () => {
    const head = await findArrived(deps, file, input.parts ?? []);
    if (head === undefined) return fail(notArrived(file));
    const kept =
      head.bytes > most
        ? await refuseUnread(deps, actor, input.act, file, tooLargeWords(purpose, head.bytes))
        : await inTurn(async () =>
            keepFile(deps, actor, {
              act: input.act,
              fileId,
              paperworkId: paperwork.id,
              purpose,
              item,
              name,
              declaredType,
              declaredBytes,
              bytes: await deps.objects.read(uploadKey, most),
            }),
          );
    // The original stands under its hash by now; what was sent is scratch.
    if (kept.ok) await deps.objects.remove(uploadKey);
    return kept;
  });
};
