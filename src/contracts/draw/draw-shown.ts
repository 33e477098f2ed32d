import type { PublicDrawAnswer } from './draw';

/** A draw on its event's public page. */
export interface DrawShown {
  readonly published: PublicDrawAnswer;
  readonly announcedAt: string;
  readonly endedAt: string | null;
  /** Cars entered in the class after the announcement: they are not in the pool. */
  readonly enteredLater: readonly string[];
  /** Cars of the pool that withdrew after the announcement. */
  readonly withdrawn: readonly string[];
}
