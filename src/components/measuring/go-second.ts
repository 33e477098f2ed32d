import { type SecondAsked, secondQuery } from '@/domain/inspection/second-set/asked';
import type { Cursor } from './sheet/sheet';

const WAIT_MS = 4000;

const isThere = async (address: string): Promise<boolean> => {
  try {
    const answer = await fetch(address, { method: 'HEAD', signal: AbortSignal.timeout(WAIT_MS) });
    // An answer that nobody reads is cut off when the page is left.
    await answer.arrayBuffer();
    return answer.ok && !answer.redirected;
  } catch {
    return false;
  }
};

/**
 * Begins an independent set at its bores: on a page that was made without the earlier ones, so that not
 * even its source holds them; without signal on this page, which hides them.
 */
export const beginSecond = async (
  asked: SecondAsked,
  part: string | undefined,
  goAndKeep: (to: Partial<Cursor>) => Promise<void>,
): Promise<void> => {
  const [bore] = asked.bores;
  await goAndKeep({
    ...(bore === undefined ? {} : { bore }),
    set: asked.set,
    cell: undefined,
    run: undefined,
    zero: undefined,
    closed: undefined,
    ...(part === undefined ? {} : { part }),
  });
  const address = `${window.location.pathname}?${secondQuery(asked)}`;
  if (await isThere(address)) window.location.assign(address);
};

/** Ends it: both sets are seen again. Says whether there was signal for it where the page lacks the first. */
export const endSecond = async (
  isBlindPage: boolean,
  goAndKeep: (to: Partial<Cursor>) => Promise<void>,
): Promise<boolean> => {
  if (isBlindPage && !(await isThere(window.location.pathname))) return false;
  await goAndKeep({ set: 1, cell: undefined, run: undefined, zero: undefined, closed: undefined });
  if (isBlindPage) window.location.assign(window.location.pathname);
  return true;
};
