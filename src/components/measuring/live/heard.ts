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
 * What another tablet has just read or struck, until this one records the next. What is hidden from an
 * independent set is among neither the rows nor the judged, and so is not told of.
 */
export const lastHeard = (
  { remarks }: Pick<SheetRows, 'remarks'>,
  judged: readonly JudgedReading[],
  onPage: SheetRows,
  whose: (row: Row) => string | undefined,
): Heard | undefined => {
  const before = idsOf(onPage);
  const isNew = (row: Row) => !before.has(row.id);
  const told = [
    ...judged.filter(({ row }) => isNew(row)).map((reading) => ({ row: reading.row, reading })),
    ...remarks.flatMap((row) => {
      if (row.kind !== 'strike' || !isNew(row)) return [];
      const struck = judged.find((one) => one.row.id === row.readingId);
      return struck === undefined ? [] : [{ row, reading: struck }];
    }),
  ];
  const last = told
    .sort((a, b) => Date.parse(a.row.occurredAt) - Date.parse(b.row.occurredAt))
    .at(-1);
  const by = last && whose(last.row);
  if (last === undefined || by === undefined) return undefined;
  const { row, reading } = last;
  const { per } = getQuantityEntry(reading.row.quantity);
  const where = per === 'engine' || per === 'car' ? '' : `${positionKey(reading.place, per)} `;
  const value = reading.row.value.text.replace('-', '−');
  const words = `${where}${value}${row === reading.row ? '' : ' struck'}`;
  return { by, words };
};
