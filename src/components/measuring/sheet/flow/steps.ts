import type { JudgedReading } from '@/domain/inspection/capture/readings-that-count';
import { type BorePosition, boreName } from '@/domain/tappet/layout/bore-layout';
import type { Part } from '../parts';
import { isComparative, type SetUp } from '../set-up';
import type { Cursor } from '../sheet';
import { type Asked, type Leads, nextCell, nextPosition, takenAt } from './taken';

/** What is entered next, and where Enter leads. */
export type Step =
  | { readonly kind: 'opening' | 'closing' }
  /** The closing zero was taken: what came of it is read before anything goes on. */
  | { readonly kind: 'closed'; readonly runId: string }
  | { readonly kind: 'cell'; readonly cell: string }
  | { readonly kind: 'bore'; readonly to: BorePosition }
  | { readonly kind: 'part'; readonly part: Part; readonly to: BorePosition }
  /** A second set is complete: both are seen side by side. */
  | { readonly kind: 'both' }
  /** Every number is there; checks are not answered yet. */
  | { readonly kind: 'checks' }
  | { readonly kind: 'done' };

export interface Standing {
  readonly part: Part;
  readonly parts: readonly Part[];
  readonly cursor: Cursor;
  readonly setUp: SetUp;
  readonly positions: readonly BorePosition[];
  readonly position: BorePosition;
  readonly judged: readonly JudgedReading[];
  readonly outOfReach: ReadonlySet<string>;
  readonly asked: Asked;
  /** Left out: to every position. */
  readonly leads?: Leads;
  /** The bores of an independent set, while one is taken. */
  readonly second: readonly string[];
}

/** The bores that one zero serves: a bank by a ring, one bore by its own lifter. */
export const scopeOf = (setUp: SetUp, position: BorePosition, set = 1): string =>
  setUp.zeroedOn === 'ring' && set === 1 ? `bank ${position.bank}` : `bore ${boreName(position)}`;

export const boresIn = (scope: string, positions: readonly BorePosition[]) =>
  positions.filter(
    (position) => scope === `bank ${position.bank}` || scope === `bore ${boreName(position)}`,
  );

const ledBy = ({ leads }: Standing) => (leads === undefined ? {} : { leads });

/** Whether the open run serves this bore. */
const served = ({ cursor, setUp, position }: Standing): boolean =>
  cursor.run?.scope === scopeOf(setUp, position, cursor.set);

/** The first part after this one that still lacks something, with the place where it lacks it. */
const nextPart = (standing: Standing): Step => {
  const { part, parts, positions, judged, outOfReach, asked } = standing;
  const at = parts.findIndex(({ key }) => key === part.key);
  const last = positions.at(-1);
  for (const other of [...parts.slice(at + 1), ...parts.slice(0, at)]) {
    const from = last === undefined ? '' : boreName(last);
    const to = nextPosition(judged, other, positions, from, outOfReach, asked, ledBy(standing));
    if (to !== undefined) return { kind: 'part', part: other, to };
  }
  return { kind: 'done' };
};

/** What comes next from where the inspector stands. */
export const nextStep = (standing: Standing): Step => {
  const { part, cursor, setUp, positions, position, judged, outOfReach, asked } = standing;
  if (cursor.closed !== undefined) return { kind: 'closed', runId: cursor.closed };
  const comparative = isComparative(setUp, part.quantity);
  if (comparative && cursor.zero !== undefined && (cursor.zero === 'opening' || cursor.run))
    return { kind: cursor.zero };
  const taken = takenAt(judged, part, position, cursor.set);
  const cell = cursor.cell ?? nextCell(asked(part, position), taken);
  if (comparative && cell !== undefined && !served(standing)) return { kind: 'opening' };
  if (cell !== undefined) return { kind: 'cell', cell };
  const here = boreName(position);
  if (comparative && cursor.run !== undefined) {
    const inRun = cursor.set > 1 ? [] : boresIn(cursor.run.scope, positions);
    const rest = nextPosition(judged, part, inRun, here, outOfReach, asked, ledBy(standing));
    return rest === undefined ? { kind: 'closing' } : { kind: 'bore', to: rest };
  }
  if (cursor.set > 1) {
    const near = positions.filter((one) => standing.second.includes(boreName(one)));
    const next = nextPosition(judged, part, near, here, outOfReach, asked, {
      set: cursor.set,
    });
    return next === undefined ? { kind: 'both' } : { kind: 'bore', to: next };
  }
  const to = nextPosition(judged, part, positions, here, outOfReach, asked, ledBy(standing));
  return to === undefined ? nextPart(standing) : { kind: 'bore', to };
};
