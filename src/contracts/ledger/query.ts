import { type Failure, type Fault, invalid } from '@/domain/failure';
import { findWhole } from '@/domain/ledger/bytes';
import { fail, ok, type Result } from '@/domain/result';

interface Wanted {
  readonly name: string;
  readonly required?: true;
}

/** Whole numbers of a query, in decimal; those that are absent and may be are left out. */
export const readWholes = <N extends string>(
  query: URLSearchParams,
  wanted: readonly (Wanted & { readonly name: N })[],
): Result<Partial<Record<N, number>>, Failure> => {
  const read: Partial<Record<N, number>> = {};
  const faults: Fault[] = [];
  for (const { name, required } of wanted) {
    const text = query.get(name);
    if (text === null) {
      if (required) faults.push({ pointer: `/${name}`, detail: `Give ${name}, a whole number.` });
      continue;
    }
    const value = findWhole(text);
    if (value === undefined) {
      faults.push({ pointer: `/${name}`, detail: 'A whole number in decimal, without a sign.' });
    } else {
      read[name] = value;
    }
  }
  return faults.length === 0 ? ok(read) : fail(invalid(faults));
};
