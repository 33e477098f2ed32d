import type { SentRow } from '@/contracts/inspection/rows';
import type { InspectionAssessment } from '@/domain/inspection/assess-inspection';
import type { JudgedReading } from '@/domain/inspection/capture/readings-that-count';
import type { CheckAsk } from '@/domain/inspection/plan/check-asks';
import type { Ask } from '@/domain/inspection/plan/plan';
import type { RackedLifter } from '@/domain/inspection/rack/rack';
import type { BorePosition } from '@/domain/tappet/layout/bore-layout';
import type { Step } from './sheet/flow/steps';
import type { Asked } from './sheet/flow/taken';
import type { Part } from './sheet/parts';
import type { SheetRows } from './sheet/recorded';
import type { Scale, SetUp } from './sheet/set-up';
import type { Cursor, Sheet, SheetGauge } from './sheet/sheet';

/** All that one moment of the sheet is, worked out once and read by every panel. */
export interface Bay {
  readonly sheet: Sheet;
  readonly cursor: Cursor;
  readonly setUp: SetUp;
  readonly positions: readonly BorePosition[];
  readonly position: BorePosition;
  readonly parts: readonly Part[];
  /** Those that Enter leads through. */
  readonly partsAsked: readonly Part[];
  /** Absent: the checks or the rack. */
  readonly part: Part | undefined;
  readonly plan: readonly Ask[];
  readonly asked: Asked;
  readonly checks: readonly CheckAsk[];
  readonly rack: readonly RackedLifter[];
  /** Without what may not be seen now. */
  readonly rows: SheetRows;
  readonly judged: readonly JudgedReading[];
  readonly assessment: InspectionAssessment;
  readonly outOfReach: ReadonlySet<string>;
  /** Whose a row is, where it was not recorded by this person at this tablet. */
  readonly whose: (row: { readonly id: string; readonly takenBy: string }) => string | undefined;
  /** An independent second set is being taken: the first is nowhere to be seen. */
  readonly blind: boolean;
  readonly step: Step | undefined;
  readonly gauge: SheetGauge | undefined;
  readonly scale: Scale | undefined;
  /** The size that two typed digits are completed from. */
  readonly base: string | undefined;
}

/** What panels may do. */
export interface Hands {
  readonly go: (to: Partial<Cursor>) => void;
  readonly setUpAs: (to: Partial<SetUp>) => void;
  /** Whether the rows are kept on this device. */
  /** Keeps rows on the device, together with where the hand goes on to. */
  readonly record: (rows: readonly SentRow[], to?: Partial<Cursor>) => Promise<boolean>;
}
