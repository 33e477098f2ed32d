import type { Written } from '../../quantity/dimension';
import type { Per } from '../../rulebook/quantities/entry';
import type { QuantityName } from '../../rulebook/quantity-catalogue';
import { boreName, type Valve } from '../../tappet/layout/bore-layout';

/** A place on the engine; parts that do not apply are empty texts. */
export interface Place {
  readonly bank: string;
  readonly cylinder: string;
  readonly valve: '' | Valve;
  /** Where a cylinder has several bores of one valve. */
  readonly index?: number | undefined;
}

export const WHOLE_ENGINE: Place = { bank: '', cylinder: '', valve: '' };

/** What every row captured in the bay carries. Rows are never changed; later rows point back. */
export interface Captured {
  readonly id: string;
  readonly takenBy: string;
  /** ISO 8601 instant in UTC, by the device's clock and its offset. */
  readonly occurredAt: string;
  /** `received`: kept and shown, not accepted; what arrived after signing, for example. */
  readonly standing: 'accepted' | 'received';
}

/** Temperatures as logged beside a reading. */
export interface LoggedTemperatures {
  readonly bore?: Written | undefined;
  readonly lifter?: Written | undefined;
  readonly setting?: Written | undefined;
  readonly gauge?: Written | undefined;
}

/** A number off a gauge. Comparative: the dial's pointer from its zero, sign as read. */
export interface ReadingRow extends Captured {
  readonly quantity: QuantityName;
  readonly place: Place;
  readonly depth: string;
  readonly axis: string;
  readonly repeat: number;
  /** 1, or 2 and on for an independent second set. */
  readonly set: number;
  readonly method: 'absolute' | 'comparative';
  readonly gaugeId: string;
  readonly zeroRunId?: string | undefined;
  readonly value: Written;
  readonly temperatures?: LoggedTemperatures | undefined;
  /** The part of the reference set that was read, where it was none of the engine's own. */
  readonly referencePart?: string | undefined;
}

/** The zero of a run, before or after it. */
export interface ZeroRow extends Captured {
  readonly runId: string;
  readonly kind: 'opening' | 'closing';
  readonly gaugeId: string;
  readonly zeroedOn: 'lifter' | 'ring';
  readonly ringId?: string | undefined;
  /** The ring's size. */
  readonly size?: Written | undefined;
  readonly reading: Written;
}

export type RemarkKind =
  | 'strike'
  | 'move'
  | 'not-reached'
  | 'check'
  | 'witness'
  | 'own-reading'
  | 'photograph'
  | 'temperature'
  | 'second-set'
  | 'lifter-out'
  | 'lifter-in'
  | 'lifters-returned';

/** What is no number: it strikes or moves a reading, answers a check, or notes something. */
export interface RemarkRow extends Captured {
  readonly kind: RemarkKind;
  /** The reading that is struck or moved. */
  readonly readingId?: string | undefined;
  /** Of a move: where the reading belongs. Of a lifter: the bore it came out of, or went into. */
  readonly place: Place;
  /**
   * Of a check or a bore out of reach: the subject or quantity. Of a lifter that went in: the bore it
   * came out of. Of the lifters' return: who signs for it.
   */
  readonly subject: string;
  /**
   * Of a check: `value`, a choice's key, `yes`, `no` and such. Of two sets: the set that stands, or
   * `pooled`. Of the lifters' return: `kept` or `changed`.
   */
  readonly answer: { readonly value?: string | undefined };
  readonly reason: string;
}

/** The key by which facts and results name a place. */
export const positionKey = (place: Place, per: Per): string => {
  if (per === 'engine' || per === 'car') return per;
  if (place.cylinder === '') return 'engine';
  if (per === 'cylinder' || place.valve === '') return place.cylinder;
  return boreName({
    bank: place.bank,
    cylinder: Number(place.cylinder),
    valve: place.valve,
    index: place.index,
  });
};

/** By the device's time, then by id, so that the order of arrival does not matter. */
export const inTakingOrder = <R extends Captured>(rows: readonly R[]): readonly R[] =>
  [...rows].sort(
    (a, b) => Date.parse(a.occurredAt) - Date.parse(b.occurredAt) || (a.id < b.id ? -1 : 1),
  );
