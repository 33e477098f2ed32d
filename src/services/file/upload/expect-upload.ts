import type { EntityManager } from '@mikro-orm/postgresql';
import type { Actor } from '@/domain/access/permission';
import { absent, type Failure, failure, invalid } from '@/domain/failure';
import { isId } from '@/domain/is-id';
import {
  type FilePurpose,
  MOST_BYTES,
  MOST_FILES,
  tooLargeWords,
} from '@/domain/paperwork/file/limits';
import { fail, ok, type Result } from '@/domain/result';
import { KeptFile } from '@/entities/paperwork/file';
import { findOwnPaperwork } from '../../paperwork/own-paperwork';
import type { Ports } from '../../ports';
import { findUnwelcome, needFor } from '../find-unwelcome';
import { withStore } from '../with-store';
import { addressUpload, type UploadAddress } from './address-upload';
import { announcedType, announceFile, tooManyBytes } from './announce-file';

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
  const empty = 'The file is empty.';
  if (bytes < 1) return failure('damaged-file', empty, [{ pointer: '/bytes', detail: empty }]);
  return bytes > MOST_BYTES[purpose] ? tooManyBytes(tooLargeWords(purpose, bytes)) : undefined;
};

const findCrowd = async (
  em: EntityManager,
  seriesId: string,
  paperworkId: string,
): Promise<Failure | undefined> => {
  const there = await em.count(KeptFile, {
    seriesId,
    paperworkId,
    state: { $ne: 'refused' },
    removedAt: null,
  });
  if (there < MOST_FILES) return undefined;
  const detail = `There are ${MOST_FILES} files already. Take one out first.`;
  return invalid([{ pointer: '', detail }]);
};

/**
 * Announces a file and answers where its bytes go, within minutes; asked again, it gives new addresses
 * for the same upload, also after a day in which it never came. It counts only after `confirmUpload` has
 * read it back.
 */
export const expectUpload = async (
  deps: Pick<Ports, 'db' | 'clock' | 'random' | 'jobs' | 'objects' | 'uploads'>,
  actor: Actor,
  input: ExpectedUpload,
): Promise<Result<UploadAddress, Failure>> => {
  const { act, fileId, paperworkId, purpose, item, name, bytes } = input;
  const known = isId(paperworkId)
    ? await findOwnPaperwork(deps.db, actor, paperworkId, false, needFor(purpose))
    : undefined;
  if (known === undefined) return fail(absent());
  const refusal = refusalOf(input);
  if (refusal !== undefined) return fail(refusal);
  const { seriesId } = known;
  const type = announcedType(input.type);
  const request = { fileId, paperworkId, purpose, item, name, type, bytes };
  const announced = await announceFile(
    deps,
    actor,
    { act, kind: 'expect-upload', seriesId, input: request },
    { id: fileId, paperworkId, purpose, item, name, declaredType: type, declaredBytes: bytes },
    {
      any: (em) => findUnwelcome(em, actor, { paperworkId, fileId, purpose }),
      more: (em) => findCrowd(em, seriesId, paperworkId),
    },
  );
  if (!announced.ok) return announced;
  const file = await deps.db.findOneOrFail(KeptFile, { seriesId, id: fileId });
  return withStore(async () => ok(await addressUpload(deps, file)));
};
