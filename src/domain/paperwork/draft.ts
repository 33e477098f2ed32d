import type { SheetCell } from './sheet/sheet-cell';
import type { ItemRemark } from './state';

/** One answer as it was typed; a choice's key, `yes` / `no`, text, or a number that may be none yet. */
export interface DraftAnswer {
  readonly subject: string;
  /** `engine` or `car`, or one bore or cylinder that differs from the rest. */
  readonly position: string;
  readonly typed: string;
  /** Of a number: the unit chosen beside it. */
  readonly unit?: string | undefined;
}

export interface DraftSheet {
  readonly subject: string;
  readonly cells: readonly SheetCell[];
}

/** Paperwork that is still being written: everything as typed, right or not, so that nothing is lost. */
export interface PaperworkDraft {
  readonly answers: readonly DraftAnswer[];
  readonly sheets: readonly DraftSheet[];
  readonly note: string;
  /** Answers to remarks that were not followed, by item. */
  readonly replies?: readonly ItemRemark[] | undefined;
}

export const EMPTY_DRAFT: PaperworkDraft = { answers: [], sheets: [], note: '' };

export const findTyped = (
  draft: PaperworkDraft,
  subject: string,
  position: string,
): DraftAnswer | undefined =>
  draft.answers.find((answer) => answer.subject === subject && answer.position === position);

export const cellsOf = (draft: PaperworkDraft, subject: string): readonly SheetCell[] =>
  draft.sheets.find((sheet) => sheet.subject === subject)?.cells ?? [];

/** With this answer in place of the one before; an empty one is taken out. */
export const withAnswer = (draft: PaperworkDraft, answer: DraftAnswer): PaperworkDraft => ({
  ...draft,
  answers: [
    ...draft.answers.filter(
      (one) => one.subject !== answer.subject || one.position !== answer.position,
    ),
    ...(answer.typed.trim() === '' ? [] : [answer]),
  ],
});

export const withCells = (
  draft: PaperworkDraft,
  subject: string,
  cells: readonly SheetCell[],
): PaperworkDraft => ({
  ...draft,
  sheets: [...draft.sheets.filter((sheet) => sheet.subject !== subject), { subject, cells }],
});

/** With this reply to the remark on an item; an empty one is taken out. */
export const withReply = (draft: PaperworkDraft, reply: ItemRemark): PaperworkDraft => ({
  ...draft,
  replies: [
    ...(draft.replies ?? []).filter(({ item }) => item !== reply.item),
    ...(reply.text.trim() === '' ? [] : [reply]),
  ],
});
