import type { EntityManager } from '@mikro-orm/postgresql';
import { sameBytes } from '@/domain/ledger/bytes';
import {
  type Checkpoint,
  openCheckpoint,
  signCheckpoint as signHead,
} from '@/domain/ledger/checkpoint';
import { formatVerifierKey, type VerifierKey } from '@/domain/ledger/note/verifier-key';
import type { Ports } from '../../ports';
import { findSize, readRoot } from '../nodes';
import { isLost } from '../restore/lost-heads';
import { findLatest } from './find-checkpoint';
import { findPublishedKey, lockSigning, publishKey } from './published-key';

export type SigningDeps = Pick<
  Ports,
  'db' | 'clock' | 'random' | 'jobs' | 'keys' | 'heads' | 'recordState'
>;

/** While the key before is at hand, it signs beside the one it handed over to. */
const signersOf = async (em: EntityManager, { keys }: SigningDeps, seriesId: string) => {
  const current = keys.signer(seriesId);
  const previous = keys.findPrevious(seriesId);
  const published = await findPublishedKey(em, seriesId);
  if (published?.key !== formatVerifierKey(current.key)) {
    throw new Error(`Another key than the published one would sign for ${seriesId}.`);
  }
  const handsOver =
    previous !== undefined && published.replaces === formatVerifierKey(previous.key);
  return handsOver ? [previous, current] : [current];
};

/** The head remembered of exactly these lines: signed once, though the database has lost its row. */
const findSame = (
  note: string | undefined,
  { size, root }: Pick<Checkpoint, 'size' | 'root'>,
  key: VerifierKey,
) => {
  const head = note === undefined ? undefined : openCheckpoint(note, [key]);
  const same = head?.ok && head.value.size === size && sameBytes(head.value.root, root);
  return same ? note : undefined;
};

/**
 * Signs the head of a series' ledger as it stands, once; a burst of acts is one head. The note is
 * remembered outside the database before it can be shown: should the database ever come back
 * without these lines, nothing more is signed until that is on record.
 */
export const signCheckpoint = async (
  deps: SigningDeps,
  { seriesId }: { readonly seriesId: string },
): Promise<void> => {
  if ((await findSize(deps.db, seriesId)) === undefined) return;
  await publishKey(deps, seriesId);
  await deps.db.fork().transactional(async (em) => {
    await lockSigning(em, seriesId);
    const size = (await findSize(em, seriesId)) ?? 0;
    if ((await findLatest(em, seriesId))?.size === size) return;
    const remembered = await deps.heads.find(seriesId);
    if (remembered !== undefined && (await isLost(em, { seriesId, note: remembered }))) {
      deps.recordState.doubt();
      throw new Error(`The ledger of ${seriesId} lacks lines of a head that was signed.`);
    }
    const signers = await signersOf(em, deps, seriesId);
    const root = await readRoot(em, seriesId, size);
    const { key } = deps.keys.signer(seriesId);
    const signedAt = deps.clock.now().toISOString();
    const note =
      findSame(remembered, { size, root }, key) ??
      (await signHead({ origin: key.name, size, root, signedAt }, [...signers]));
    await deps.heads.remember(seriesId, note);
    await em.execute('select append.checkpoint(?, ?, ?)', [seriesId, size, note]);
  });
};
