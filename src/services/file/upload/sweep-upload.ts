import { LockMode } from '@mikro-orm/postgresql';
import { ok } from '@/domain/result';
import { KeptFile } from '@/entities/paperwork/file';
import { performAct } from '../../act/perform-act';
import { actIdFor } from '../../notice/act-id';
import type { Ports } from '../../ports';

const HOUR = 60 * 60 * 1000;
const DAY = 24 * HOUR;

export const NEVER_CONFIRMED =
  'The file was announced and not confirmed within a day: what had been sent of it is removed. Send it again.';

/** When an upload announced at an instant is looked at. */
export const sweptAt = (announcedAt: Date): Date => new Date(announcedAt.getTime() + DAY);

/**
 * Refuses an announced file that was never confirmed within a day, and removes what was sent of it. Of a
 * file that counts by then, or was refused, only what was sent once more is removed; done once, however
 * often the job comes back.
 */
export const sweepUpload = async (
  deps: Pick<Ports, 'db' | 'clock' | 'random' | 'jobs' | 'objects' | 'uploads'>,
  { seriesId, fileId }: { readonly seriesId: string; readonly fileId: string },
): Promise<void> => {
  const file = await deps.db.findOne(KeptFile, { seriesId, id: fileId });
  // Of an erased file there is no row; what was still sent of it afterwards goes now.
  if (file === null) await deps.objects.remove(`uploads/${seriesId}/${fileId}`);
  if (file === null) return;
  // Put there once more after it had been read: nothing names it.
  if (file.state !== 'expected' && file.uploadKey !== '') await deps.objects.remove(file.uploadKey);
  if (file.state !== 'expected') return;
  // The queue's clock is the database's: it may run a little ahead of this one.
  if (deps.clock.now().getTime() < sweptAt(file.createdAt).getTime() - HOUR) return;
  // Announced anew, it is looked at anew.
  const id = actIdFor('sweep-upload', `${fileId} ${file.createdAt.toISOString()}`);
  const swept = await performAct(
    deps,
    null,
    { id, kind: 'sweep-upload', seriesId, input: { fileId } },
    async ({ em }) => {
      const lock = { lockMode: LockMode.PESSIMISTIC_WRITE };
      const row = await em.findOneOrFail(KeptFile, { seriesId, id: fileId }, lock);
      if (row.state !== 'expected') return ok({ refused: false });
      Object.assign(row, { state: 'refused', refusedBecause: NEVER_CONFIRMED });
      // Under the row's lock, so that no confirmation can be reading it.
      await deps.objects.remove(row.uploadKey);
      if (row.uploadId) await deps.uploads.drop(row.uploadKey, row.uploadId);
      return ok({ refused: true });
    },
  );
  if (!swept.ok) throw new Error(swept.failure.detail);
};
