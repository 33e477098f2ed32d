import type { DraftAnswer, PaperworkDraft } from '../draft';
import type { SheetCell } from '../sheet/sheet-cell';
import type { ItemRemark } from '../state';

/** One thing that a person fills in; the key is the same on every device. */
export type DraftField =
  | { readonly kind: 'answer'; readonly answer: DraftAnswer }
  | { readonly kind: 'cell'; readonly sheet: string; readonly cell: SheetCell }
  | { readonly kind: 'reply'; readonly reply: ItemRemark }
  | { readonly kind: 'note'; readonly text: string };

export type DraftFields = ReadonlyMap<string, DraftField>;

const cellKey = (sheet: string, { position, quantity, depth, axis }: SheetCell): string =>
  ['cell', sheet, position, quantity, depth, axis].join('|');

/** Everything typed in a draft, by what it is. */
export const draftFields = (draft: PaperworkDraft): DraftFields =>
  new Map<string, DraftField>([
    ...draft.answers.map(
      (answer) =>
        [`answer|${answer.subject}|${answer.position}`, { kind: 'answer', answer }] as const,
    ),
    ...draft.sheets.flatMap(({ subject, cells }) =>
      cells.map(
        (cell) => [cellKey(subject, cell), { kind: 'cell', sheet: subject, cell }] as const,
      ),
    ),
    ...(draft.replies ?? []).map(
      (reply) => [`reply|${reply.item}`, { kind: 'reply', reply }] as const,
    ),
    ...(draft.note === '' ? [] : [['note', { kind: 'note', text: draft.note }] as const]),
  ]);

/** What was typed; empty where nothing was. Where a value came from makes no difference. */
export const typedIn = (field: DraftField | undefined): string => {
  if (field === undefined) return '';
  if (field.kind === 'answer')
    return [field.answer.typed, field.answer.unit ?? ''].join(' ').trim();
  if (field.kind === 'cell')
    return field.cell.typed === '' ? '' : `${field.cell.typed} ${field.cell.unit}`;
  return field.kind === 'reply' ? field.reply.text : field.text;
};

/** The draft that these fields make; sheets stand in the order in which their first value comes. */
export const draftFrom = (fields: readonly DraftField[]): PaperworkDraft => {
  const sheets = new Map<string, SheetCell[]>();
  for (const field of fields) {
    if (field.kind !== 'cell') continue;
    sheets.set(field.sheet, [...(sheets.get(field.sheet) ?? []), field.cell]);
  }
  const replies = fields.flatMap((field) => (field.kind === 'reply' ? [field.reply] : []));
  return {
    answers: fields.flatMap((field) => (field.kind === 'answer' ? [field.answer] : [])),
    sheets: [...sheets].map(([subject, cells]) => ({ subject, cells })),
    note: fields.flatMap((field) => (field.kind === 'note' ? [field.text] : [])).join(''),
    ...(replies.length > 0 && { replies }),
  };
};
