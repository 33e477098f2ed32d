import { wallTimeAt } from '../../deadline/zone';
import {
  calibrationState,
  type Gauge,
  type GaugeKind,
  type LargerReads,
  reaches,
} from '../../measurement/gauge';
import type { Dimension, Written } from '../../quantity/dimension';
import { findUnit } from '../../quantity/find-unit';
import type { Quantity } from '../../quantity/quantity';
import { fromStored } from '../../quantity/stored';

/** A gauge of the register as plain data; numbers as text. Dates are ISO 8601 (`2026-03-02`). */
export interface GaugeRecord {
  readonly id: string;
  readonly code: string;
  readonly kind: GaugeKind;
  readonly division?: Written | undefined;
  readonly range?: { readonly from: Written; readonly to: Written } | undefined;
  readonly largerReads?: LargerReads | undefined;
  readonly certificate?:
    | {
        readonly number: string;
        readonly expandedUncertainty: Written;
        readonly coverageFactor: string;
        readonly degreesOfFreedom?: string | undefined;
      }
    | undefined;
  readonly calibratedOn?: string | undefined;
  readonly dueOn?: string | undefined;
  /** Checked on the series' ring this night, where the class lets that count. */
  readonly checkedOnRing?: boolean | undefined;
  /** Taken out of use: what it read is kept and supports no breach. */
  readonly withdrawn?: boolean | undefined;
}

/** The record with its figures read; those of another dimension than asked are left out. */
export const gaugeOf = <D extends Dimension>(record: GaugeRecord, dimension: D): Gauge<D> => {
  const read = (written: Written | undefined): Quantity<D> | undefined =>
    written === undefined || findUnit(dimension, written.unit) === undefined
      ? undefined
      : fromStored(written, dimension);
  const from = read(record.range?.from);
  const to = read(record.range?.to);
  const expandedUncertainty = read(record.certificate?.expandedUncertainty);
  const { certificate } = record;
  return {
    kind: record.kind,
    division: read(record.division),
    range: from && to && { from, to },
    largerReads: record.largerReads,
    certificate: certificate &&
      expandedUncertainty && {
        expandedUncertainty,
        coverageFactor: Number(certificate.coverageFactor),
        degreesOfFreedom:
          certificate.degreesOfFreedom === undefined
            ? undefined
            : Number(certificate.degreesOfFreedom),
      },
    calibratedOn: record.calibratedOn,
    dueOn: record.dueOn,
  };
};

const CALIBRATION = {
  overdue: 'was overdue for calibration',
  'not-yet': 'was calibrated only afterwards',
  never: 'has no calibration on record',
} as const;

/** The calendar day of an instant in the event's zone, `2026-07-15`. */
const dayIn = (zone: string, at: string): string => {
  const { year, month, day } = wallTimeAt(zone, Date.parse(at));
  return [year, month, day].map((part) => String(part).padStart(2, '0')).join('-');
};

/** Why a reading with this gauge cannot support a breach; nothing when it can. */
export const findWeakness = (
  record: GaugeRecord,
  reading: {
    readonly occurredAt: string;
    readonly zone: string;
    readonly size?: Quantity | undefined;
  },
): string | undefined => {
  const { size } = reading;
  if (size !== undefined && !reaches(gaugeOf(record, size.dimension), size))
    return `${size.text} ${size.unit} is out of the range of gauge ${record.code}`;
  if (record.withdrawn === true) return `gauge ${record.code} is withdrawn`;
  if (record.checkedOnRing === true) return undefined;
  const state = calibrationState(
    gaugeOf(record, 'length'),
    dayIn(reading.zone, reading.occurredAt),
  );
  return state === 'in-calibration' ? undefined : `gauge ${record.code} ${CALIBRATION[state]}`;
};
