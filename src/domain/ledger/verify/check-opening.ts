import { findHex } from '../bytes';
import { opens } from '../commitment';
import type { Line } from '../line';

/** Whether this line commits, under this role, to content of this SHA-256 with this salt. */
export const lineCommitsTo = (
  line: Line,
  role: string,
  saltHex: string,
  contentHash: Uint8Array,
): boolean => {
  const entry = line.commitments.find((commitment) => commitment.role === role);
  const commitment = findHex(entry?.commitment ?? '', 32);
  const salt = findHex(saltHex, 32);
  return commitment !== undefined && salt !== undefined && opens(commitment, salt, contentHash);
};
