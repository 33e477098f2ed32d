import type { BoreMark } from '@/domain/paperwork/bore-marks';
import type { Status } from '../../look/status';
import type { BoreState } from '../../tappet/BoreMap';

const STATUS: Readonly<Record<BoreMark, Status>> = {
  'to-correct': 'unreadable',
  outside: 'outside',
  'too-close': 'too-close',
  within: 'within',
  'not-measured': 'not-measured',
};

/** The map's marks from the sheet's. */
export const boreStates = (
  marks: ReadonlyMap<string, BoreMark>,
): Readonly<Record<string, BoreState>> =>
  Object.fromEntries([...marks].map(([key, mark]) => [key, { status: STATUS[mark] }]));
