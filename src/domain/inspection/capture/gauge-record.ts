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
import type { RingCheck } from '../gauge/ring-check';

/** Instants in UTC. A gauge with no good check before is bad from the beginning: no `goodUntil`. */
export interface GaugeFault {
  readonly goodUntil?: string | undefined;
  readonly foundAt: string;
}

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
  /** Checks on the series' rings at the event. */
  readonly ringChecks?: readonly RingCheck[] | undefined;
  /** Found bad: nothing that it read between the two instants can support a breach. */
  readonly faults?: readonly GaugeFault[] | undefined;
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

/** Why a reading cannot support a breach. `overdue`: a check on the ring may make up for it. */
export interface Weakness {
  readonly words: string;
  readonly overdue: boolean;
}

const wasBad = ({ faults = [] }: GaugeRecord, at: string): boolean =>
  faults.some(
    ({ goodUntil, foundAt }) =>
      Date.parse(at) <= Date.parse(foundAt) &&
      (goodUntil === undefined || Date.parse(at) > Date.parse(goodUntil)),
  );

/** Why a reading with this gauge cannot support a breach; nothing when it can. */
export const findWeakness = (
  record: GaugeRecord,
  reading: {
    readonly occurredAt: string;
    readonly zone: string;
    readonly size?: Quantity | undefined;
  },
): Weakness | undefined => {
  const { size } = reading;
  const hard = (words: string): Weakness => ({ words, overdue: false });
  if (size !== undefined && !reaches(gaugeOf(record, size.dimension), size))
    return hard(`${size.text} ${size.unit} is out of the range of gauge ${record.code}`);
  if (wasBad(record, reading.occurredAt))
    return hard(`gauge ${record.code} was found bad, and read this after its last good check`);
  // What was found bad is judged by the instants of its fault; without one, nothing it read is firm.
  const after = (record.faults ?? []).every(
    ({ foundAt }) => Date.parse(reading.occurredAt) > Date.parse(foundAt),
  );
  if (record.withdrawn === true && after) return hard(`gauge ${record.code} is withdrawn`);
  const state = calibrationState(
    gaugeOf(record, 'length'),
    dayIn(reading.zone, reading.occurredAt),
  );
  return state === 'in-calibration'
    ? undefined
    : { words: `gauge ${record.code} ${CALIBRATION[state]}`, overdue: state === 'overdue' };
};
