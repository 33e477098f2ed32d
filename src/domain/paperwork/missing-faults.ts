import type { Fault } from '../failure';
import { cellWords } from './sheet/judge-cells';
import type { StillMissing } from './still-missing';

const step = (text: string): string => text.replaceAll('~', '~0').replaceAll('/', '~1');

/** Every gap with a JSON Pointer into the draft: `/answers/tappet-type`, `/sheets/lifter-sheet/3 intake, bore`. */
export const missingFaults = (missing: StillMissing): readonly Fault[] => [
  ...missing.questions.map((question) => ({
    pointer: `/answers/${step(question.subject)}`,
    detail: `${question.question} is not answered.`,
  })),
  ...missing.photographs.map((shot) => ({
    pointer: `/photographs/${step(shot.subject)}`,
    detail: `A photograph showing ${shot.visible.join(', ')} is missing.`,
  })),
  ...missing.sheets.map(({ form, values }) => ({
    pointer: `/sheets/${step(form.subject)}`,
    detail:
      form.columns.length === 0
        ? `${form.title} is missing.`
        : `${form.title}: ${values} ${values === 1 ? 'value is' : 'values are'} missing.`,
  })),
  ...missing.cells.map(({ cell, detail }) => ({
    pointer: `/sheets/${step(cellWords(cell))}`,
    detail: detail ?? 'This cannot be read.',
  })),
  ...missing.remarks.map(({ item, text }) => ({
    pointer: `/replies/${step(item)}`,
    detail: `Nothing was changed after the remark “${text}”. Change it, or answer the remark.`,
  })),
];
