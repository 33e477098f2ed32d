import type { GaugeRecord } from '@/domain/inspection/capture/gauge-record';
import type { Place } from '@/domain/inspection/capture/rows';
import type { InspectionState } from '@/domain/inspection/state';
import type { PaperworkDocument } from '@/domain/paperwork/document';
import type { Written } from '@/domain/quantity/dimension';
import type { RulesInForce } from '@/domain/rulebook/rules-in-force';
import type { BoreLayout, BorePosition } from '@/domain/tappet/layout/bore-layout';
import type { Part } from './parts';
import type { SheetRows } from './recorded';

export interface SheetGauge extends GaugeRecord {
  readonly name: string;
  readonly size?: Written | undefined;
}

/** Everything the measuring screen starts from; plain JSON, so that it can be kept. */
export interface Sheet {
  readonly inspectionId: string;
  readonly personId: string;
  readonly carNumber: string;
  readonly engine: string;
  readonly engineId: string | null;
  readonly competitor: string;
  readonly bay: string;
  readonly inspector: string;
  readonly zone: string;
  readonly state: InspectionState;
  readonly layout: BoreLayout;
  readonly rules: RulesInForce;
  readonly gauges: readonly SheetGauge[];
  readonly rows: SheetRows;
  readonly paperwork: PaperworkDocument | null;
  /** A bore whose first set this page was made without: an independent second one is taken here. */
  readonly second?: string | undefined;
  /** The server's clock when it made the page; the device measures its own against it. */
  readonly servedAt: string;
}

/** Where the inspector stands. Kept on the device, so that a reload opens at the same bore. */
export interface Cursor {
  readonly bore: string;
  /** A part's key, `checks`, or `rack`. */
  readonly part: string;
  /** The cell chosen by hand; else the first empty one. */
  readonly cell?: string | undefined;
  /** 2 and on: an independent second set, the first hidden. */
  readonly set: number;
  /** The zero run that is open, and the bores it is for. */
  readonly run?: { readonly id: string; readonly scope: string } | undefined;
  /** A zero is to be read next. */
  readonly zero?: 'opening' | 'closing' | undefined;
  /** The run that was closed just now, until what came of it has been seen. */
  readonly closed?: string | undefined;
}

export const placeOf = (position: BorePosition, per: Part['per']): Place => {
  if (per === 'engine' || per === 'car') return { bank: '', cylinder: '', valve: '' };
  const cylinder = String(position.cylinder);
  if (per === 'cylinder') return { bank: position.bank, cylinder, valve: '' };
  return {
    bank: position.bank,
    cylinder,
    valve: position.valve,
    ...(position.index === undefined ? {} : { index: position.index }),
  };
};

export const samePlace = (a: Place, b: Place): boolean =>
  a.cylinder === b.cylinder && a.valve === b.valve && (a.index ?? 0) === (b.index ?? 0);
