import type { Force } from '../clause';
import type { CheckingLifter } from '../limit';
import type { Per } from '../quantities/entry';
import type { QuantityName } from '../quantity-catalogue';
import type { Option, SheetKind } from '../requirement';

interface Asked {
  /** The subject, or the quantity's name: the key of the answer. */
  readonly subject: string;
  readonly question: string;
  readonly per: Per;
  /** Clauses the answer is held against. */
  readonly clauses: readonly string[];
  /** The strongest of those clauses. */
  readonly force: Force;
  /** The rule in words, to show beside the question. */
  readonly rule: string;
}

export type Question =
  | (Asked & { readonly kind: 'choice'; readonly options: readonly Option[] })
  | (Asked & { readonly kind: 'yes-no' })
  | (Asked & { readonly kind: 'text' })
  | (Asked & {
      readonly kind: 'number';
      readonly quantity: QuantityName;
      readonly unit: string;
      readonly datum?: string | undefined;
      readonly checkingLifter?: CheckingLifter | undefined;
    });

export interface Shot {
  readonly subject: string;
  readonly clause: string;
  readonly heading: string;
  readonly visible: readonly string[];
}

export interface SheetColumn {
  /** A quantity's name; `lifter-body-diameter` and such. */
  readonly quantity: QuantityName;
  readonly label: string;
  readonly unit: string;
  /** Clauses whose check needs the column. */
  readonly clauses: readonly string[];
}

/** What a sheet has a row for; of a cam table the crankshaft angle. */
export type SheetRow = Per | 'degree';

export interface SheetForm {
  readonly sheet: SheetKind;
  readonly subject: string;
  readonly title: string;
  readonly per: SheetRow;
  readonly columns: readonly SheetColumn[];
  readonly clauses: readonly string[];
}

export interface PaperworkForm {
  readonly questions: readonly Question[];
  readonly photographs: readonly Shot[];
  readonly sheets: readonly SheetForm[];
}
