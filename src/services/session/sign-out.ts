import type { Ports } from '../ports';
import { endSession } from './start-session';

/** Ends the session; a second time changes nothing. */
export const signOut = (deps: Pick<Ports, 'db' | 'clock'>, token: string): Promise<void> =>
  deps.db.fork().transactional((em) => endSession(deps, em, token));
