import type { KeptFile } from '@/entities/paperwork/file';
import { NEVER_CONFIRMED } from './sweep-upload';

/** What an announcement says of a file. */
export interface Announced {
  readonly paperworkId: string;
  readonly purpose: string;
  readonly item: string;
  readonly declaredType: string;
  readonly declaredBytes: number;
  readonly by: string;
}

/** Whether a file of this id is the one announced before by the same person; another one is refused. */
export const isSameFile = (file: KeptFile, announced: Announced): boolean =>
  file.removedAt === null &&
  file.paperworkId === announced.paperworkId &&
  file.purpose === announced.purpose &&
  file.item === announced.item &&
  file.declaredType === announced.declaredType &&
  Number(file.declaredBytes) === announced.declaredBytes &&
  file.createdBy === announced.by;

/**
 * Expects the file anew from this instant: one that was given up because it never came in its day may
 * still come. What is kept, or was refused for what it is, stays as it is.
 */
export const expectAgain = (file: KeptFile, at: Date): void => {
  const givenUp = file.state === 'refused' && file.refusedBecause === NEVER_CONFIRMED;
  if (givenUp) Object.assign(file, { state: 'expected', refusedBecause: null, uploadId: null });
  if (file.state === 'expected') file.createdAt = at;
};
