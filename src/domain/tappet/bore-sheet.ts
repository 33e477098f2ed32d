import type { Gauge } from '../measurement/gauge';
import type { Material } from '../measurement/material';
import type { Repeatability } from '../measurement/repeatability';
import type { Quantity } from '../quantity/quantity';

export type Length = Quantity<'length'>;

/** One reading in a bore; `null` where none was taken. */
export interface PlaceReading {
  /** A depth's name; depths run from the top in the order they first appear. */
  readonly depth: string;
  readonly axis: string;
  readonly reading: Length | null;
  /** Place in the taking order of the run, from 1; as listed when absent. */
  readonly order?: number | undefined;
}

/** The gauge's zero before and after a run of readings. */
export interface Zeros {
  readonly opening?: Length | undefined;
  readonly closing?: Length | undefined;
  /** Readings in the whole run, where it spans several bores. */
  readonly readingsInRun?: number | undefined;
}

export interface Temperatures {
  readonly bore: Quantity<'temperature'>;
  readonly lifter: Quantity<'temperature'>;
  /** The setting ring or standard. */
  readonly setting?: Quantity<'temperature'> | undefined;
  /** The micrometer and the gauge; taken as 20 °C when absent. */
  readonly gauge?: Quantity<'temperature'> | undefined;
}

/** Everything read for one bore and its lifter. */
export interface BoreSheet {
  /** Unit of the results. */
  readonly unit: string;
  /** Comparative: dial readings from a zero. Absolute: diameters. */
  readonly method: 'comparative' | 'absolute';
  readonly lifter: readonly Length[];
  readonly bore: readonly PlaceReading[];
  /** Known size of the setting ring; without it a comparative zero is this lifter at its widest. */
  readonly zeroSize?: Length | undefined;
  readonly zeros?: Zeros | undefined;
  /** What read the bore; a dial bore gauge of 0.0001 in unless stated. */
  readonly gauge?: Gauge<'length'> | undefined;
  /** What read the lifter; a 0–1 in micrometer of 0.0001 in unless stated. */
  readonly lifterGauge?: Gauge<'length'> | undefined;
  readonly settingRing?: Gauge<'length'> | undefined;
  readonly temperatures?: Temperatures | undefined;
  /** Iron block and steel lifter unless stated. */
  readonly materials?: { readonly bore: Material; readonly lifter: Material } | undefined;
  /** From a study or pooled over the inspection; else from this sheet's true repeats. */
  readonly repeatability?: Repeatability | undefined;
  /** Width of the permitted zone: what drift and temperature are weighed against. */
  readonly window?: Length | undefined;
  /** The class's number for window ÷ 2U; "2" unless stated. */
  readonly fitRatio?: string | undefined;
}
