import checkValues from '../check-values.json';

interface CheckValue {
  readonly id: string;
  readonly inputs: Record<string, unknown>;
  readonly expected: Record<string, unknown>;
  readonly tolerance: unknown;
  readonly source: string;
  readonly origin: string;
  readonly note?: string;
  readonly reproduced?: boolean;
}

/** A published check by its id; throws when the file does not hold it. */
export function checkValue(id: string): CheckValue {
  const found = (checkValues as readonly unknown[] as readonly CheckValue[]).find(
    (candidate) => candidate.id === id,
  );
  if (found === undefined) throw new Error(`no check value ${id}`);
  return found;
}

/** What stands beside a check: its source, and whether it is from memory, constructed or not reproduced. */
export function provenance({ source, origin, reproduced }: CheckValue): string {
  const marks = [
    ...(origin === 'from_memory' ? ['from memory'] : []),
    ...(origin === 'constructed' ? ['constructed'] : []),
    ...(reproduced === false ? ['not reproduced'] : []),
  ];
  return [source, ...marks].join('; ');
}

/** Log relative error: the number of correct significant digits, at most 15.95 (NIST StRD's measure). */
export function correctDigits(found: number, certified: number): number {
  if (found === certified) return 15.95;
  const error =
    certified === 0 ? Math.abs(found) : Math.abs(found - certified) / Math.abs(certified);
  return Math.min(15.95, -Math.log10(error));
}
