import { stampWords } from '@/domain/verdict/instant-words';
import { hashWords } from '@/domain/verdict/notice/notice-words';

/** A public page: nothing in it depends on who asks, and it may be kept for a moment. */
export const publicHeaders = (headers: Headers, seconds = 15): void =>
  headers.set('cache-control', `public, max-age=${seconds}`);

/** The signed head for the foot of a public page, shortened for reading. */
export const shownCheckpoint = (head: {
  readonly zone: string;
  readonly checkpoint:
    | {
        readonly number: number;
        readonly lines: number;
        readonly root: string;
        readonly signedAt: string;
      }
    | undefined;
}) => {
  const { checkpoint, zone } = head;
  return checkpoint === undefined
    ? {}
    : {
        checkpoint: {
          number: checkpoint.number,
          lines: checkpoint.lines,
          head: hashWords(checkpoint.root),
          signedAt: stampWords(checkpoint.signedAt, zone),
        },
      };
};
