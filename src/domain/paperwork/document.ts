import type { Written } from '../quantity/dimension';
import type { QuantityName } from '../rulebook/quantity-catalogue';
import type { BoreLayout } from '../tappet/layout/bore-layout';
import type { ItemRemark } from './state';

/** Who and what is declared: stands in every version of the paperwork as it was on that day. */
export interface DeclaredEngine {
  readonly id: string;
  /** The owner's own name for it, `VR-2231`. */
  readonly reference: string;
  readonly layout: BoreLayout;
  readonly blockCasting: string;
  readonly headCastings: string;
  readonly serial: string;
}

/** A choice's key, `yes` / `no` or text as `value`, or a number as `written`; at `engine`, `car`, a cylinder or a bore. */
export type DeclaredAnswer = {
  readonly subject: string;
  readonly position: string;
} & ({ readonly value: string } | { readonly written: Written });

/** Where a number was read from: the file as it was named, and the cell, `D7`. */
export interface CellSource {
  readonly fileId: string;
  readonly file: string;
  readonly cell: string;
  /** What stands in the cell, where the person corrected it by hand. */
  readonly held?: string | undefined;
}

/** One number of a measurement sheet. */
export interface DeclaredReading {
  /** A bore's name (`3 intake`), a cylinder's number, or `engine`. */
  readonly position: string;
  readonly quantity: QuantityName;
  /** `above`, `below`; empty where the sheet gives one reading a place. */
  readonly depth: string;
  /** `along`, `across`; empty likewise. */
  readonly axis: string;
  readonly value: Written;
  /** Absent for a number that was typed in. */
  readonly source?: CellSource | undefined;
}

export interface DeclaredSheet {
  /** The sheet's subject in the rulebook, `lifter-sheet`. */
  readonly subject: string;
  readonly readings: readonly DeclaredReading[];
}

/** A file that belongs to the paperwork; the bytes stand in the object store under their hash. */
export interface DeclaredFile {
  readonly item: string;
  readonly fileId: string;
  readonly name: string;
  /** Hexadecimal. */
  readonly sha256: string;
  readonly bytes: string;
  readonly type: string;
}

/**
 * Paperwork as it was handed in: kept for good, hashed, and what an inspection compares with. On disk
 * it is canonical JSON of strings (`toDocument`); `readPaperworkDocument` of the contracts reads it back.
 */
export interface PaperworkDocument {
  readonly document: 'tagwire/paperwork';
  readonly version: '1';
  readonly series: string;
  readonly season: string;
  readonly className: string;
  readonly competitor: string;
  readonly carNumber: string;
  readonly engine: DeclaredEngine;
  /** Hexadecimal hash of the rules it was checked against when it was handed in. */
  readonly rulesHash: string;
  readonly answers: readonly DeclaredAnswer[];
  readonly sheets: readonly DeclaredSheet[];
  readonly photographs: readonly DeclaredFile[];
  /** Sheets and other papers as files. */
  readonly files: readonly DeclaredFile[];
  /** What the competitor wants the officials to know. */
  readonly note: string;
  /** What the competitor answered to remarks that were not followed; absent where there were none. */
  readonly replies?: readonly ItemRemark[] | undefined;
}
