import { LockMode } from '@mikro-orm/postgresql';
import type { Actor } from '@/domain/access/permission';
import { absent, type Failure, failure, invalid } from '@/domain/failure';
import {
  type FilePurpose,
  MOST_BYTES,
  MOST_FILES,
  tooLargeWords,
} from '@/domain/paperwork/file/limits';
import { fail, ok, type Result } from '@/domain/result';
import { KeptFile } from '@/entities/paperwork/file';
import { performAct } from '../act/perform-act';
import { findOwnPaperwork, isId } from '../paperwork/own-paperwork';
import type { Ports } from '../ports';
import { addressUpload, type UploadAddress } from './address-upload';
import { expectAgain, isSameFile } from './announce-again';
import { needFor, takesFile } from './own-file';
import { sweptAt } from './sweep-upload';
import { withStore } from './with-store';

export interface ExpectedUpload {
  readonly act: string;
  /** Client-made UUIDv7. */
  readonly fileId: string;
  readonly paperworkId: string;
  readonly purpose: FilePurpose;
  /** The photograph's or sheet's subject in the rulebook. */
  readonly item: string;
  readonly name: string;
  readonly type: string;
  readonly bytes: number;
}

/** What can be refused before a byte is sent. */
const refusalOf = ({ purpose, bytes }: ExpectedUpload): Failure | undefined => {
  if (bytes < 1) return failure('damaged-file', 'The file is empty.');
  if (bytes > MOST_BYTES[purpose]) return failure('too-large', tooLargeWords(purpose, bytes));
  return undefined;
};

export const wrongPlace = (): Failure =>
  failure('not-in-this-state', 'This paperwork is handed in; files are added to a draft.');

/**
 * Announces a file and answers where its bytes go, within minutes; asked again, it gives new addresses
 * for the same upload, also after a day in which it never came. It counts only after `confirmUpload` has read it back.
 */
export const expectUpload = async (
  deps: Pick<Ports, 'db' | 'clock' | 'random' | 'jobs' | 'objects' | 'uploads'>,
  actor: Actor,
  input: ExpectedUpload,
): Promise<Result<UploadAddress, Failure>> => {
  const { act, fileId, paperworkId, purpose, item, name, bytes } = input;
  const need = needFor(purpose);
  const known = isId(paperworkId)
    ? await findOwnPaperwork(deps.db, actor, paperworkId, false, need)
    : undefined;
  if (known === undefined) return fail(absent());
  const refusal = refusalOf(input);
  if (refusal !== undefined)
    return fail({ ...refusal, faults: [{ pointer: '/bytes', detail: refusal.detail }] });
  const { seriesId } = known;
  const type = input.type.trim() === '' ? 'application/octet-stream' : input.type.trim();
  const request = { fileId, paperworkId, purpose, item, name, type, bytes };
  const uploadKey = `uploads/${seriesId}/${fileId}`;
  const expected = await performAct(
    deps,
    actor,
    { id: act, kind: 'expect-upload', seriesId, input: request },
    async ({ em, at, send }) => {
      const paperwork = await findOwnPaperwork(em, actor, paperworkId, true, need);
      if (paperwork === undefined) return fail(absent());
      if (!(await takesFile(em, paperwork, fileId))) return fail(wrongPlace());
      const lock = { lockMode: LockMode.PESSIMISTIC_WRITE };
      const before = await em.findOne(KeptFile, { seriesId, id: fileId }, lock);
      if (before !== null) {
        const { personId: by } = actor;
        const announced = { paperworkId, purpose, item, by };
        if (!isSameFile(before, { ...announced, declaredType: type, declaredBytes: bytes }))
          return fail(absent());
        expectAgain(before, at);
        send('sweep-uploads', { seriesId, fileId }, sweptAt(at));
        return ok({ fileId });
      }
      const there = await em.count(KeptFile, {
        seriesId,
        paperworkId,
        state: { $ne: 'refused' },
        removedAt: null,
      });
      if (there >= MOST_FILES) {
        const detail = `There are ${MOST_FILES} files already. Take one out first.`;
        return fail(invalid([{ pointer: '', detail }]));
      }
      em.persist(
        em.create(KeptFile, {
          seriesId,
          id: fileId,
          paperworkId,
          purpose,
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
  const file = await deps.db.findOneOrFail(KeptFile, { seriesId, id: fileId });
  return withStore(async () => ok(await addressUpload(deps, file)));
};
