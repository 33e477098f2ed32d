import type { SentReading, SentRemark, SentZero } from '@/contracts/inspection/rows';
import { type Place, WHOLE_ENGINE } from '@/domain/inspection/capture/rows';
import type { StrikeReason } from '@/domain/inspection/capture/strike-reasons';
import type { Written } from '@/domain/quantity/dimension';
import type { BorePosition } from '@/domain/tappet/layout/bore-layout';
import { uuidV7 } from '../queue/uuid-v7';
import type { Part } from './parts';
import { isComparative, type SetUp } from './set-up';
import { placeOf, type SheetGauge } from './sheet';

interface Base {
  readonly gauge: SheetGauge;
  readonly setUp: SetUp;
  readonly gauges: readonly SheetGauge[];
  readonly value: Written;
}

const made = () => ({ id: uuidV7(), occurredAt: new Date().toISOString() });

const zeroRow = (
  end: SentZero['end'],
  { gauge, setUp, gauges, value, runId }: Base & { readonly runId: string },
): SentZero => {
  const ring = gauges.find((one) => one.id === setUp.ringId);
  const onRing = setUp.zeroedOn === 'ring' && ring?.size !== undefined;
  return {
    kind: 'zero',
    ...made(),
    runId,
    end,
    gaugeId: gauge.id,
    zeroedOn: onRing ? 'ring' : 'lifter',
    ...(onRing && ring?.size ? { ringId: ring.id, size: ring.size } : {}),
    reading: value,
  };
};

export const openingRow = (base: Base & { readonly runId: string }): SentZero =>
  zeroRow('opening', base);

export const closingRow = (base: Base & { readonly runId: string }): SentZero =>
  zeroRow('closing', base);

export const readingRow = (
  from: Base & {
    readonly part: Part;
    readonly position: BorePosition;
    /** A cell's key, depth and axis. */
    readonly cell: string;
    readonly repeat: number;
    readonly set: number;
    readonly runId: string | undefined;
  },
): SentReading => {
  const { part, position, cell, setUp } = from;
  const [depth = '', axis = ''] = cell.split('/');
  const hasTemperatures = Object.keys(setUp.temperatures).length > 0;
  return {
    kind: 'reading',
    ...made(),
    quantity: part.quantity,
    place: placeOf(position, part.per),
    depth: part.reference === true ? '' : depth,
    axis,
    repeat: from.repeat,
    set: from.set,
    method: isComparative(setUp, part.quantity) ? 'comparative' : 'absolute',
    gaugeId: from.gauge.id,
    ...(from.runId === undefined ? {} : { zeroRunId: from.runId }),
    value: from.value,
    ...(hasTemperatures ? { temperatures: setUp.temperatures } : {}),
    ...(part.reference === true ? { referencePart: depth } : {}),
  };
};

export const strikeRow = (readingId: string, place: Place, reason: StrikeReason): SentRemark => ({
  kind: 'remark',
  ...made(),
  place,
  remark: 'strike',
  readingId,
  reason,
});

export const moveRow = (readingId: string, to: Place): SentRemark => ({
  kind: 'remark',
  ...made(),
  place: to,
  remark: 'move',
  readingId,
  reason: 'entered at the wrong bore',
});

export const notReachedRow = (place: Place, reason: string): SentRemark => ({
  kind: 'remark',
  ...made(),
  place,
  remark: 'not-reached',
  subject: '',
  reason,
});

/** The lifter of a bore comes out. */
export const lifterOutRow = (place: Place): SentRemark => ({
  kind: 'remark',
  ...made(),
  place,
  remark: 'lifter-out',
  reason: '',
});

/** The lifter named by the bore it came out of goes into one. */
export const lifterInRow = (place: Place, lifter: string): SentRemark => ({
  kind: 'remark',
  ...made(),
  place,
  remark: 'lifter-in',
  subject: lifter,
  reason: '',
});

export const liftersReturnedRow = (
  signedBy: string,
  value: 'kept' | 'changed',
  reason: string,
): SentRemark => ({
  kind: 'remark',
  ...made(),
  place: WHOLE_ENGINE,
  remark: 'lifters-returned',
  subject: signedBy,
  value,
  reason,
});

/** Which of several sets of a bore stands, with the reason. */
export const standsRow = (place: Place, value: string, reason: string): SentRemark => ({
  kind: 'remark',
  ...made(),
  place,
  remark: 'second-set',
  value,
  reason,
});

export const checkRow = (place: Place, subject: string, value: string): SentRemark => ({
  kind: 'remark',
  ...made(),
  place,
  remark: 'check',
  subject,
  value,
  reason: '',
});

export const photographRow = (place: Place, subject: string, fileId: string): SentRemark => ({
  kind: 'remark',
  ...made(),
  place,
  remark: 'photograph',
  subject,
  value: fileId,
  reason: '',
});
