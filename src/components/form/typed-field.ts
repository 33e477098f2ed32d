import type { FieldProblem } from './problems';

/** What the fields of one form show: each its words, what was typed into it and what is wrong with it. */
export const typedField =
  (typed: ReadonlyMap<string, string>, problems: readonly FieldProblem[]) =>
  (name: string, label: string, hint?: string) => ({
    name,
    label,
    value: typed.get(name) ?? '',
    problems,
    ...(hint === undefined ? {} : { hint }),
  });
