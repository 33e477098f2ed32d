import type { PaperworkForm, Question, SheetForm, Shot } from '../rulebook/form/form';
import type { RulesInForce } from '../rulebook/rules-in-force';
import type { BoreLayout } from '../tappet/layout/bore-layout';
import { isAnswered } from './answers';
import { LOBES, lobeOf } from './cam/cam-place';
import type { PaperworkFile } from './declare';
import { cellsOf, type PaperworkDraft } from './draft';
import { type JudgedCell, judgeCells } from './sheet/judge-cells';
import { rowsFor } from './sheet/positions';
import type { SheetCell } from './sheet/sheet-cell';
import type { ItemRemark } from './state';

/** What stands between a draft and handing it in. */
export interface StillMissing {
  readonly questions: readonly Question[];
  readonly photographs: readonly Shot[];
  /** Sheets that a clause asks for by name and that have no complete numbers. */
  readonly sheets: readonly { readonly form: SheetForm; readonly values: number }[];
  /** Cells that are no number, or in question. */
  readonly cells: readonly JudgedCell[];
  /** Remarks of the version that came back, neither followed nor answered. */
  readonly remarks: readonly ItemRemark[];
}

/** Whether a mandatory clause asks for this sheet; others are worth giving and hold nobody up. */
export const isAskedByName = (
  rules: Pick<RulesInForce, 'clauses'>,
  { subject }: SheetForm,
): boolean =>
  rules.clauses.some(
    ({ force, requirement }) =>
      force === 'mandatory' && requirement?.kind === 'sheet' && requirement.subject === subject,
  );

/** A place whose row is not full, and the quantities that it lacks. */
export interface IncompletePlace {
  readonly position: string;
  readonly lacks: readonly string[];
}

/** A lobe is there with as many lifts as make a curve; how fine its steps are is the person’s own matter. */
const FEWEST_LIFTS = 3;

const incompleteLobes = (
  written: readonly SheetCell[],
  { columns }: SheetForm,
): readonly IncompletePlace[] =>
  LOBES.filter((lobe) => written.filter((cell) => lobeOf(cell) === lobe).length < FEWEST_LIFTS).map(
    (lobe) => ({
      position: `${lobe} lobe`,
      lacks: columns.map(({ label }) => label.toLowerCase()),
    }),
  );

/** Place by place, what the sheet does not say yet. */
export const incompletePlaces = (
  draft: PaperworkDraft,
  form: SheetForm,
  layout: BoreLayout,
): readonly IncompletePlace[] => {
  const written = cellsOf(draft, form.subject).filter((cell) => cell.typed.trim() !== '');
  if (form.per === 'degree') return incompleteLobes(written, form);
  const given = new Set(written.map(({ position, quantity }) => `${position}|${quantity}`));
  return rowsFor(form.per, layout).flatMap(({ key }) => {
    const lacks = form.columns
      .filter(({ quantity }) => !given.has(`${key}|${quantity}`))
      .map(({ label }) => label.toLowerCase());
    return lacks.length === 0 ? [] : [{ position: key, lacks }];
  });
};

/** Places of the sheet without a number; a sheet without columns is wanted as a file. */
export const emptyValues = (draft: PaperworkDraft, form: SheetForm, layout: BoreLayout): number =>
  incompletePlaces(draft, form, layout).reduce((sum, { lacks }) => sum + lacks.length, 0);

/**
 * Answers to mandatory clauses, photographs, sheets that a clause asks for by name, and no cell that is
 * faulty or in question. Whether the numbers comply stops nobody from handing them in.
 */
export const stillMissing = (
  draft: PaperworkDraft,
  rules: Pick<RulesInForce, 'clauses'>,
  form: PaperworkForm,
  layout: BoreLayout,
  files: readonly Pick<PaperworkFile, 'item' | 'purpose'>[],
  remarks: readonly ItemRemark[] = [],
): StillMissing => ({
  questions: form.questions.filter(
    (question) => question.force === 'mandatory' && !isAnswered(draft, question, layout),
  ),
  photographs: form.photographs.filter(
    (shot) => !files.some((file) => file.purpose === 'photograph' && file.item === shot.subject),
  ),
  sheets: form.sheets
    .filter((sheet) => isAskedByName(rules, sheet))
    .map((sheet) => ({ form: sheet, values: emptyValues(draft, sheet, layout) }))
    .filter(({ form: sheet, values }) =>
      sheet.columns.length > 0
        ? values > 0
        : !files.some((file) => file.purpose === 'sheet' && file.item === sheet.subject),
    ),
  cells: draft.sheets.flatMap((sheet) =>
    judgeCells(sheet.cells).filter((cell) => cell.state !== 'ok'),
  ),
  remarks,
});

export const isComplete = (missing: StillMissing): boolean =>
  [missing.questions, missing.photographs, missing.sheets, missing.cells, missing.remarks].every(
    (list) => list.length === 0,
  );

const counted = (count: number, one: string, many: string): readonly string[] =>
  count === 0 ? [] : [`${count} ${count === 1 ? one : many}`];

/** `3 answers and 1 photograph missing, 2 cells to correct`; empty when nothing is. */
export const missingWords = (missing: StillMissing): string => {
  const values = missing.sheets.reduce((sum, sheet) => sum + Math.max(1, sheet.values), 0);
  const absentParts = [
    ...counted(missing.questions.length, 'answer', 'answers'),
    ...counted(missing.photographs.length, 'photograph', 'photographs'),
    ...counted(values, 'value', 'values'),
  ];
  const absent =
    absentParts.length === 0
      ? []
      : [`${absentParts.join(', ').replace(/, ([^,]*)$/, ' and $1')} missing`];
  return [
    ...absent,
    ...counted(missing.cells.length, 'cell to correct', 'cells to correct'),
    ...counted(missing.remarks.length, 'remark to answer', 'remarks to answer'),
  ].join(', ');
};
