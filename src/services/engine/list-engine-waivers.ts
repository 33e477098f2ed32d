import type { OwnPaperworkRow } from '@/domain/paddock/paddock-rows';
import type { Waiver } from '@/domain/rulebook/ruling';

import type { Ports } from '../ports';
import { findRules } from '../rulebook/find-rules';

export interface WaiversOfClass {
  readonly waivers: readonly Waiver[];
  readonly carNumber: string;
  readonly zone: string;
}

/** Waivers that count at this time in the classes an engine is declared for. They are public. */
export const listEngineWaivers = async (
  { db, clock }: Pick<Ports, 'db' | 'clock'>,
  paperwork: readonly OwnPaperworkRow[],
): Promise<readonly WaiversOfClass[]> => {
  const classes = new Map(
    paperwork
      .filter(({ state }) => state !== 'withdrawn')
      .map((row) => [`${row.classId} ${row.carNumber}`, row]),
  );
  return Promise.all(
    [...classes.values()].map(async ({ seriesId, classId, carNumber, zone }) => {
      const standing = await findRules(db, seriesId, classId, clock.now());
      return { waivers: standing?.rules.waivers ?? [], carNumber, zone };
    }),
  );
};
