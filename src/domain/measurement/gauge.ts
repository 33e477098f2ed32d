import type { Dimension } from '../quantity/dimension';
import type { Quantity } from '../quantity/quantity';

export const GAUGE_KINDS = [
  'micrometer',
  'dial-bore-gauge',
  'telescoping-gauge',
  'caliper',
  'setting-ring',
  'plug-gauge',
  'scale',
  'other',
] as const;

export type GaugeKind = (typeof GAUGE_KINDS)[number];

/** Which way the pointer goes when the part is larger; checked by thumb. Many bore gauges read minus. */
export type LargerReads = 'plus' | 'minus';

export interface Certificate<D extends Dimension = Dimension> {
  /** U as printed, with its k. */
  readonly expandedUncertainty: Quantity<D>;
  readonly coverageFactor: number;
  readonly degreesOfFreedom?: number | undefined;
}

/** Any measuring instrument, as far as its figures go. Dates are ISO 8601 (`2026-03-02`). */
export interface Gauge<D extends Dimension = Dimension> {
  readonly kind: GaugeKind;
  readonly division?: Quantity<D> | undefined;
  readonly range?: { readonly from: Quantity<D>; readonly to: Quantity<D> } | undefined;
  readonly largerReads?: LargerReads | undefined;
  readonly certificate?: Certificate<D> | undefined;
  readonly calibratedOn?: string | undefined;
  readonly dueOn?: string | undefined;
}

export type CalibrationState = 'in-calibration' | 'overdue' | 'not-yet' | 'never';

/** On a given day; the due day itself still counts. */
export const calibrationState = (gauge: Gauge, on: string): CalibrationState => {
  if (gauge.calibratedOn === undefined) return 'never';
  if (on < gauge.calibratedOn) return 'not-yet';
  return gauge.dueOn !== undefined && on > gauge.dueOn ? 'overdue' : 'in-calibration';
};

/** Whether a size lies in the gauge's range, ends included; a gauge without a stated range holds all. */
export const reaches = (gauge: Gauge, size: Quantity): boolean => {
  if (gauge.range === undefined) return true;
  const { from, to } = gauge.range;
  const over = (a: Quantity, b: Quantity) => a.value.n * b.value.d >= b.value.n * a.value.d;
  return over(size, from) && over(to, size);
};
