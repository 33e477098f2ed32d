import { useCallback, useRef } from 'react';
import type { Bay, Hands } from './bay';
import type { Typed } from './sheet/keys/typing';

export interface Hold {
  /** Told of each key: the first digit holds the cell, erasing the last one lets it go. */
  readonly onTyped: (before: Typed, after: Typed) => void;
  /** The number was kept or given up: whoever goes on says where to. */
  readonly drop: () => void;
}

/**
 * Keeps the cell, or the zero, that a number was begun for under the hand: what another tablet reads
 * meanwhile may fill that very cell or make another one the next, and the number must not move there.
 */
export const useHold = (bay: Bay | undefined, go: Hands['go']): Hold => {
  const held = useRef<'cell' | 'zero'>(undefined);
  const latest = useRef(bay);
  latest.current = bay;
  const onTyped = useCallback(
    (before: Typed, after: Typed) => {
      const now = latest.current;
      if (before.digits === '' && after.digits !== '' && now !== undefined) {
        const { step, cursor } = now;
        if (step?.kind === 'cell' && cursor.cell === undefined) {
          held.current = 'cell';
          go({ cell: step.cell });
        }
        const isZero = step?.kind === 'opening' || step?.kind === 'closing';
        if (isZero && cursor.zero === undefined) {
          held.current = 'zero';
          go({ zero: step.kind });
        }
      }
      if (before.digits !== '' && after.digits === '' && held.current !== undefined) {
        go(held.current === 'cell' ? { cell: undefined } : { zero: undefined });
        held.current = undefined;
      }
    },
    [go],
  );
  const drop = useCallback(() => {
    held.current = undefined;
  }, []);
  return { onTyped, drop };
};
