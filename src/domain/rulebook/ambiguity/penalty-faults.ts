import type { Fault } from '../../failure';
import type { PenaltyRow } from '../edition';
import { isBlank, when } from './check';

/** What a penalty schedule leaves open; pointers begin at `/penalties`. */
export const penaltyFaults = (penalties: readonly PenaltyRow[]): readonly Fault[] =>
  penalties.flatMap((row, i) => {
    const pointer = `/penalties/${i}`;
    return [
      ...when(isBlank(row.row), `${pointer}/row`, 'The row needs a name, such as A.'),
      ...when(
        penalties.findIndex((other) => other.row === row.row) < i,
        `${pointer}/row`,
        `There are two rows ${row.row}.`,
      ),
      ...when(
        row.penalties.length === 0,
        `${pointer}/penalties`,
        'Say what the first breach costs.',
      ),
      ...row.penalties.flatMap((penalty, step) =>
        when(isBlank(penalty), `${pointer}/penalties/${step}`, 'Say what this step costs.'),
      ),
    ];
  });
