import type { SheetNow } from '@/contracts/inspection/sheet';
import type { Sheet } from '../sheet/sheet';

const same = (a: unknown, b: unknown): boolean => JSON.stringify(a) === JSON.stringify(b);

/**
 * The sheet with what the server has now. Its record only grows, so an answer that was overtaken on its
 * way says less than is shown and changes nothing; where nothing is new the sheet stays the same object.
 * Rows that are only on this device are none of the server's: they are joined afterwards.
 */
export const newer = (sheet: Sheet, now: SheetNow): Sheet => {
  if (now.batch < sheet.batch) return sheet;
  const { batch, state, correcting, rows, gauges, people } = now;
  const told = { state, correcting, gauges, people };
  const shown = {
    state: sheet.state,
    correcting: sheet.correcting,
    gauges: sheet.gauges,
    people: sheet.people,
  };
  if (batch === sheet.batch && same(told, shown)) return sheet;
  return { ...sheet, ...told, batch, rows };
};
