import { useCallback, useEffect, useRef, useState } from 'react';
import { boreName, positionsOf } from '@/domain/tappet/layout/bore-layout';
import { keepPlace, readPlace } from './queue/device-store';
import { type SetUp, usualSetUp } from './sheet/set-up';
import type { Cursor, Sheet } from './sheet/sheet';

interface Kept {
  readonly cursor: Cursor;
  readonly setUp: SetUp;
}

/** Where the inspector stands and how the sheet is set up; both outlive a reload of this device. */
export const usePlace = (sheet: Sheet, firstPart: string) => {
  const { inspectionId } = sheet;
  const [first] = positionsOf(sheet.layout);
  const [place, setPlace] = useState<Kept>(() => ({
    cursor: {
      bore: sheet.second?.bores[0] ?? (first === undefined ? '' : boreName(first)),
      part: firstPart,
      set: sheet.second?.set ?? 1,
    },
    setUp: usualSetUp(sheet.gauges, sheet.servedAt.slice(0, 10)),
  }));
  const [isRead, setIsRead] = useState(false);
  const isKeeping = useRef(false);

  useEffect(() => {
    readPlace<Kept>(inspectionId)
      .then((kept) => {
        if (kept === undefined) return;
        const { second } = sheet;
        const elsewhere =
          second !== undefined &&
          (!second.bores.includes(kept.cursor.bore) || kept.cursor.set !== second.set);
        setPlace((usual) => ({
          cursor: elsewhere ? { ...usual.cursor, part: kept.cursor.part } : kept.cursor,
          // What a newer version chooses besides has its usual answer.
          setUp: { ...usual.setUp, ...kept.setUp },
        }));
      })
      .catch(() => undefined)
      .finally(() => setIsRead(true));
  }, [inspectionId, sheet]);

  useEffect(() => {
    if (isRead && !isKeeping.current) keepPlace(inspectionId, place).catch(() => undefined);
  }, [inspectionId, isRead, place]);

  const go = useCallback(
    (to: Partial<Cursor>) =>
      setPlace(({ cursor, setUp }) => ({ cursor: { ...cursor, ...to }, setUp })),
    [],
  );
  const setUpAs = useCallback(
    (to: Partial<SetUp>) =>
      setPlace(({ cursor, setUp }) => ({ cursor, setUp: { ...setUp, ...to } })),
    [],
  );
  /** Keeps having gone there together with something else; no place of before is written over it. */
  const keepAfter = useCallback(
    async (to: Partial<Cursor>, keep: (after: Kept) => Promise<void>) => {
      isKeeping.current = true;
      try {
        await keep({ ...place, cursor: { ...place.cursor, ...to } });
      } finally {
        isKeeping.current = false;
      }
    },
    [place],
  );
  /** Goes there, resolved once this device has it: for leaving the page. */
  const goAndKeep = useCallback(
    (to: Partial<Cursor>) => {
      go(to);
      return keepAfter(to, (after) => keepPlace(inspectionId, after));
    },
    [go, inspectionId, keepAfter],
  );
  return { goAndKeep, keepAfter, cursor: place.cursor, setUp: place.setUp, isRead, go, setUpAs };
};
