import type { Failure } from '@/domain/failure';

/** What ProblemSummary and the fields of a form show: the pointer's first step names the field. */
export interface FieldProblem {
  readonly field?: string;
  readonly message: string;
}

/** A failure as lines at the top of the form; `/name` leads to the field with id `name`. */
export const problemsOf = (failure: Failure): readonly FieldProblem[] =>
  (failure.faults ?? [{ pointer: '', detail: failure.detail }]).map(({ pointer, detail }) => {
    const field = pointer.split('/')[1];
    return field === undefined || field === '' ? { message: detail } : { field, message: detail };
  });

export const messageAt = (problems: readonly FieldProblem[], field: string): string | undefined =>
  problems.find((problem) => problem.field === field)?.message;
