export interface Kappa {
  /** null when chance alone would already make the two agree on everything. */
  readonly kappa: number | null;
  readonly observed: number;
  readonly expected: number;
}

/**
 * Cohen's kappa (1960) of a square table of counts: rows one inspector's answers, columns the
 * other's. (observed − expected) ÷ (1 − expected) agreement.
 */
export function kappa(table: readonly (readonly number[])[]): Kappa {
  if (table.some((row) => row.length !== table.length))
    throw new RangeError('the table is not square');
  const total = (values: readonly number[]) => values.reduce((a, x) => a + x, 0);
  const n = total(table.flat());
  if (n === 0) throw new RangeError('the table is empty');
  const agreed = total(table.map((row, i) => row[i] ?? 0));
  const byChance = total(
    table.map((row, i) => total(row) * total(table.map((other) => other[i] ?? 0))),
  );
  // (n·agreed − byChance) ÷ (n² − byChance) is the same ratio without rounding the counts first.
  const rest = n * n - byChance;
  return {
    kappa: rest === 0 ? null : (n * agreed - byChance) / rest,
    observed: agreed / n,
    expected: byChance / (n * n),
  };
}
