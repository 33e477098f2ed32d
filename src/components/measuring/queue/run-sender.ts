import { type SendDeps, type SendOutcome, sendWaiting } from './send-waiting';

const LOCK = 'tagwire-bay-sender';
const EVERY_MS = 8_000;

/**
 * Keeps sending while the page lives: now, whenever the network comes back or the page is looked at
 * again, and every few seconds. One tab at a time holds the lock, so that two never send the same.
 *
 * @returns how to ask for a sending now, and how to stop
 */
export const runSender = (
  deps: SendDeps,
  tell: (outcome: SendOutcome) => void,
): { readonly now: () => void; readonly stop: () => void } => {
  let again = false;
  let busy = false;
  let stopped = false;

  const attempt = async (): Promise<void> => {
    if (busy) {
      again = true;
      return;
    }
    busy = true;
    try {
      do {
        again = false;
        const outcome = await navigator.locks.request(LOCK, { ifAvailable: true }, (lock) =>
          lock === null ? undefined : sendWaiting(deps),
        );
        if (outcome !== undefined && !stopped) tell(outcome);
      } while (again && !stopped);
    } catch {
      if (!stopped) tell('unreachable');
    } finally {
      busy = false;
    }
  };

  const now = () => void attempt();
  const seen = () => document.visibilityState === 'visible' && now();
  window.addEventListener('online', now);
  document.addEventListener('visibilitychange', seen);
  const timer = window.setInterval(now, EVERY_MS);
  now();
  return {
    now,
    stop: () => {
      stopped = true;
      window.removeEventListener('online', now);
      document.removeEventListener('visibilitychange', seen);
      window.clearInterval(timer);
    },
  };
};
