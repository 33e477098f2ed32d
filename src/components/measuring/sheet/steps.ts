import type { JudgedReading } from '@/domain/inspection/capture/readings-that-count';
import type { ZeroRow } from '@/domain/inspection/capture/rows';
import { type BorePosition, boreName } from '@/domain/tappet/layout/bore-layout';
import type { Part } from './parts';
import { isComparative, type SetUp } from './set-up';
import type { Cursor } from './sheet';
import { nextCell, nextPosition, takenAt } from './taken';

/** What is entered next, and where Enter leads. */
export type Step =
  | { readonly kind: 'opening' | 'closing' }
  | { readonly kind: 'cell'; readonly cell: string }
  | { readonly kind: 'bore'; readonly to: BorePosition }
  | { readonly kind: 'done' };

export interface Standing {
  readonly part: Part;
  readonly cursor: Cursor;
  readonly setUp: SetUp;
  readonly positions: readonly BorePosition[];
  readonly position: BorePosition;
  readonly judged: readonly JudgedReading[];
  readonly zeros: readonly ZeroRow[];
  readonly outOfReach: ReadonlySet<string>;
}

/** The bores that one zero serves: a bank by a ring, one bore by its own lifter. */
export const scopeOf = (setUp: SetUp, position: BorePosition): string =>
  setUp.zeroedOn === 'ring' ? `bank ${position.bank}` : `bore ${boreName(position)}`;

export const boresIn = (scope: string, positions: readonly BorePosition[]) =>
  positions.filter(
    (position) => scope === `bank ${position.bank}` || scope === `bore ${boreName(position)}`,
  );

/** Whether the open run serves this bore. */
const served = ({ cursor, setUp, position }: Standing): boolean =>
  cursor.run?.scope === scopeOf(setUp, position);

/** What comes next from where the inspector stands. */
export const nextStep = (standing: Standing): Step => {
  const { part, cursor, setUp, positions, position, judged, outOfReach } = standing;
  const comparative = isComparative(setUp, part.quantity);
  if (comparative && cursor.zero !== undefined && (cursor.zero === 'opening' || cursor.run))
    return { kind: cursor.zero };
  const taken = takenAt(judged, part, position, cursor.set);
  const cell = cursor.cell ?? nextCell(part, taken);
  if (comparative && cell !== undefined && !served(standing)) return { kind: 'opening' };
  if (cell !== undefined) return { kind: 'cell', cell };
  if (comparative && cursor.run !== undefined) {
    const inRun = boresIn(cursor.run.scope, positions);
    const rest = nextPosition(judged, part, inRun, boreName(position), outOfReach);
    return rest === undefined ? { kind: 'closing' } : { kind: 'bore', to: rest };
  }
  const to = nextPosition(judged, part, positions, boreName(position), outOfReach);
  return to === undefined ? { kind: 'done' } : { kind: 'bore', to };
};
