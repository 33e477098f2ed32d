import type { JudgedReading } from '@/domain/inspection/capture/readings-that-count';
import { positionKey } from '@/domain/inspection/capture/rows';
import { getQuantityEntry } from '@/domain/rulebook/quantity-catalogue';
import type { SheetRows } from '../sheet/recorded';
import type { Sheet } from '../sheet/sheet';

interface Row {
  readonly id: string;
  readonly takenBy: string;
}

const idsOf = ({ readings, zeros, remarks }: SheetRows): ReadonlySet<string> =>
  new Set([readings, zeros, remarks].flat().map(({ id }) => id));

/**
 * Whose a row is, where it is not this person's at this tablet: a name, or "another tablet" for one of
 * their own that came while the page was open.
 */
export const whoseFrom = (
  { personId, people }: Pick<Sheet, 'personId' | 'people'>,
  onPage: SheetRows,
  own: ReadonlySet<string>,
): ((row: Row) => string | undefined) => {
  const before = idsOf(onPage);
  return ({ id, takenBy }) => {
    if (own.has(id)) return undefined;
    if (takenBy !== personId) return people[takenBy] ?? 'another inspector';
    return before.has(id) ? undefined : 'another tablet';
  };
};

export interface Heard {
  readonly by: string;
  /** "5 intake 0.8423", "5 intake 0.8423 struck". */
  readonly words: string;
}

/**
 * The last thing that another tablet read or struck while this page was open. What is hidden from an
 * independent set is among neither the rows nor the judged, and so is not told of.
 */
export const lastHeard = (
  { remarks }: Pick<SheetRows, 'remarks'>,
  judged: readonly JudgedReading[],
  onPage: SheetRows,
  whose: (row: Row) => string | undefined,
): Heard | undefined => {
  const before = idsOf(onPage);
  const words = ({ row, place }: JudgedReading, more = '') => {
    const { per } = getQuantityEntry(row.quantity);
    const where = per === 'engine' || per === 'car' ? '' : `${positionKey(place, per)} `;
    return `${where}${row.value.text.replace('-', '−')}${more}`;
  };
  const told = [
    ...judged.map((reading) => ({ row: reading.row, words: words(reading) })),
    ...remarks.flatMap((row) => {
      const struck = row.kind === 'strike' && judged.find((one) => one.row.id === row.readingId);
      return struck ? [{ row, words: words(struck, ' struck') }] : [];
    }),
  ].flatMap(({ row, words: said }) => {
    const by = before.has(row.id) ? undefined : whose(row);
    return by === undefined ? [] : [{ at: Date.parse(row.occurredAt), by, words: said }];
  });
  const last = told.sort((a, b) => a.at - b.at).at(-1);
  return last && { by: last.by, words: last.words };
};
