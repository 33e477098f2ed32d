import { useEffect, useState } from 'react';
import { placeKey, type SheetCell } from '@/domain/paperwork/sheet/sheet-cell';

type Edits = ReadonlyMap<string, SheetCell>;

const keyOf = (fileId: string): string => `sheet-edits ${fileId}`;

const stored = (fileId: string): Edits => {
  try {
    const cells: readonly SheetCell[] = JSON.parse(sessionStorage.getItem(keyOf(fileId)) ?? '[]');
    return new Map(cells.map((cell) => [placeKey(cell), cell]));
  } catch {
    return new Map();
  }
};

/** What was put right in a file before it counts: it outlives a reload of the page, and ends with the confirmation. */
export const useKeptEdits = (fileId: string) => {
  const [edits, setEdits] = useState<Edits>(new Map());
  useEffect(() => setEdits(stored(fileId)), [fileId]);

  const change = (cell: SheetCell): void =>
    setEdits((before) => {
      const after = new Map([...before, [placeKey(cell), cell] as const]);
      try {
        sessionStorage.setItem(keyOf(fileId), JSON.stringify([...after.values()]));
      } catch {
        // A full or forbidden store: the edits still live as long as the page.
      }
      return after;
    });
  const forget = (): void => sessionStorage.removeItem(keyOf(fileId));
  return { edits, change, forget };
};
