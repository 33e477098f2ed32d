import type { SheetNow } from '@/contracts/inspection/sheet';
import type { Place } from '@/domain/inspection/capture/rows';
import type { SecondAsked } from '@/domain/inspection/second-set/asked';
import type { PaperworkDocument } from '@/domain/paperwork/document';
import type { RulesInForce } from '@/domain/rulebook/rules-in-force';
import type { BoreLayout, BorePosition } from '@/domain/tappet/layout/bore-layout';
import type { Part } from './parts';

export type SheetGauge = SheetNow['gauges'][number];

/** Everything the measuring screen starts from; plain JSON, so that it can be kept. */
export interface Sheet extends SheetNow {
  readonly inspectionId: string;
  readonly seriesId: string;
  /** How far the series' barn had come before the rows were read. */
  readonly mark: string | undefined;
  readonly personId: string;
  readonly carNumber: string;
  readonly engine: string;
  readonly engineId: string | null;
  readonly competitor: string;
  readonly bay: string;
  readonly inspector: string;
  readonly zone: string;
  readonly layout: BoreLayout;
  readonly rules: RulesInForce;
  readonly paperwork: PaperworkDocument | null;
  /** This page was made without what earlier sets read at these bores: an independent one is taken here. */
  readonly second?: SecondAsked | undefined;
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
