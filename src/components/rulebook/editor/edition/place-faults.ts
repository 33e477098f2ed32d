import type { Fault } from '@/domain/failure';
import type { PlacedFault } from '../clause/FaultList';
import { PENALTIES } from './draft-state';
import type { Row } from './numbering';

/** Each fault with the row that it is in, so that it can be gone to. */
export const placeFaults = (
  rows: readonly Row[],
  faults: readonly Fault[],
): readonly PlacedFault[] =>
  faults.map(({ pointer, detail }): PlacedFault => {
    const [, kind, index = ''] = pointer.split('/');
    if (kind === 'penalties') return { key: PENALTIES, place: 'Penalties', pointer, detail };
    const row = rows[Number(index)];
    const within = pointer.split('/').slice(3).join('/');
    return index === '' || row === undefined
      ? { key: undefined, place: '', pointer, detail }
      : { key: row.key, place: row.clause.number, pointer: `/${within}`, detail };
  });

export type FaultsByRow = ReadonlyMap<string | undefined, readonly PlacedFault[]>;

export const byRow = (faults: readonly PlacedFault[]): FaultsByRow => {
  const found = new Map<string | undefined, PlacedFault[]>();
  for (const fault of faults) {
    const here = found.get(fault.key);
    if (here === undefined) found.set(fault.key, [fault]);
    else here.push(fault);
  }
  return found;
};

const NONE: readonly PlacedFault[] = [];

export const faultsOf = (faults: FaultsByRow, key: string): readonly PlacedFault[] =>
  faults.get(key) ?? NONE;
