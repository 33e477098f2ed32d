import { failure } from '@/domain/failure';
import type { Ports, RecordState } from '../../ports';
import { findLostHeads } from './lost-heads';

const behind = failure(
  'read-only',
  'The database was restored to an earlier state than the one last signed for. Nothing can be written until an administrator records the restore.',
);

/**
 * Looks once, at the start, and again whenever there is doubt. While something is lost every
 * question looks anew, so that all processes go on as soon as the restore is on record.
 */
export const watchRecord = (ports: () => Pick<Ports, 'db' | 'heads'>): RecordState => {
  let sound = false;
  return {
    findObstacle: async () => {
      if (sound) return undefined;
      sound = (await findLostHeads(ports())).length === 0;
      return sound ? undefined : behind;
    },
    doubt: () => {
      sound = false;
    },
  };
};
