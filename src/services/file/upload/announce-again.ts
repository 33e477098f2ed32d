import type { KeptFile } from '@/entities/paperwork/file';
import { NEVER_CONFIRMED } from './sweep-upload';

/** A file as it is announced, and what it belongs to: a paperwork, an inspection or a gauge. */
export type AnnouncedFile = Pick<
  KeptFile,
  'id' | 'purpose' | 'item' | 'name' | 'declaredType' | 'declaredBytes'
> &
  Partial<Pick<KeptFile, 'paperworkId' | 'inspectionId' | 'gaugeId'>>;

/** Whether a file of this id is the one announced before by the same person; another one is refused. */
export const isSameFile = (file: KeptFile, announced: AnnouncedFile, by: string): boolean =>
  file.removedAt === null &&
  (['paperworkId', 'inspectionId', 'gaugeId'] as const).every(
    (owner) => (file[owner] ?? null) === (announced[owner] ?? null),
  ) &&
  file.purpose === announced.purpose &&
  file.item === announced.item &&
  file.declaredType === announced.declaredType &&
  Number(file.declaredBytes) === announced.declaredBytes &&
  file.createdBy === by;

/**
 * Expects the file anew from this instant: one that was given up because it never came in its day may
 * still come. What is kept, or was refused for what it is, stays as it is.
 */
export const expectAgain = (file: KeptFile, at: Date): void => {
  const givenUp = file.state === 'refused' && file.refusedBecause === NEVER_CONFIRMED;
  if (givenUp) Object.assign(file, { state: 'expected', refusedBecause: null, uploadId: null });
  if (file.state === 'expected') file.createdAt = at;
};
