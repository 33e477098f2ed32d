import type { Clause } from '../clause';
import type { Per, Source } from '../quantities/entry';
import { getQuantityEntry, type QuantityName, readingsFor } from '../quantity-catalogue';
import type { SheetKind } from '../requirement';
import type { SheetColumn, SheetForm } from './form';

const SHEETS: Readonly<Record<Source, { readonly sheet: SheetKind; readonly title: string }>> = {
  'lifter-sheet': { sheet: 'lifters', title: 'Lifter sheet, one row per bore' },
  'engine-sheet': { sheet: 'engine', title: 'Build sheet' },
  'cam-sheet': { sheet: 'camshaft', title: 'Cam card' },
  'weight-sheet': { sheet: 'weights', title: 'Weights' },
};

interface Needed {
  readonly source: Source;
  readonly per: Per;
  readonly columns: Map<QuantityName, Set<string>>;
}

/** A lifter is written in the row of its bore. */
const rowOf = (per: Per): Per => (per === 'lifter' ? 'bore' : per);

const needed = (clauses: readonly Clause[]): readonly Needed[] => {
  const sheets = new Map<string, Needed>();
  for (const { number, requirement: rule } of clauses) {
    if (rule?.kind !== 'limit' && rule?.kind !== 'reference-average') continue;
    if (rule.per === 'engine' || rule.per === 'car') continue;
    const { source } = getQuantityEntry(rule.quantity);
    const per = rowOf(rule.per);
    const key = `${source} ${per}`;
    const sheet = sheets.get(key) ?? { source, per, columns: new Map() };
    sheets.set(key, sheet);
    for (const quantity of readingsFor(rule.quantity)) {
      sheet.columns.set(quantity, (sheet.columns.get(quantity) ?? new Set()).add(number));
    }
  }
  return [...sheets.values()];
};

const column = (quantity: QuantityName, clauses: ReadonlySet<string>): SheetColumn => {
  const { label, unit } = getQuantityEntry(quantity);
  return { quantity, label, unit, clauses: [...clauses] };
};

/** Lobe lift, unless the rules limit the lift at the valve alone. */
const liftIn = (clauses: readonly Clause[]): QuantityName => {
  const limited = clauses.flatMap(({ requirement: rule }) =>
    rule?.kind === 'limit' || rule?.kind === 'reference-average' ? [rule.quantity] : [],
  );
  return limited.includes('valve-lift') && !limited.includes('lobe-lift')
    ? 'valve-lift'
    : 'lobe-lift';
};

/** The clauses that a table of lifts answers: those on the lift and on the duration. */
const liftColumn = (clauses: readonly Clause[]): SheetColumn => {
  const quantity = liftIn(clauses);
  const named = clauses.filter(
    ({ requirement: rule }) =>
      (rule?.kind === 'limit' || rule?.kind === 'reference-average') &&
      (rule.quantity === quantity || rule.quantity === 'duration'),
  );
  return column(quantity, new Set(named.map(({ number }) => number)));
};

/** Sheets by what limits need per bore, lifter or cylinder, and those that a clause asks by name. */
export const sheetsFrom = (clauses: readonly Clause[]): readonly SheetForm[] => {
  const asked = clauses.flatMap(({ number, requirement }) =>
    requirement?.kind === 'sheet' ? [{ number, ...requirement }] : [],
  );
  const worked = needed(clauses).map(({ source, per, columns }): SheetForm => {
    const { sheet, title } = SHEETS[source];
    const named = asked.filter((row) => row.sheet === sheet);
    const numbers = [...columns.values()].flatMap((set) => [...set]);
    return {
      sheet,
      subject: named[0]?.subject ?? source,
      title: named[0]?.title ?? title,
      per,
      columns: [...columns].map(([quantity, set]) => column(quantity, set)),
      clauses: [...new Set([...named.map((row) => row.number), ...numbers])],
    };
  });
  const covered = new Set(worked.map((form) => form.sheet));
  const files = asked
    .filter((row) => row.sheet === 'other' || !covered.has(row.sheet))
    .map((row): SheetForm => {
      const { sheet, subject, title, number } = row;
      const base = { sheet, subject, title };
      if (sheet !== 'lift-table') return { ...base, per: 'engine', columns: [], clauses: [number] };
      const lift = liftColumn(clauses);
      return { ...base, per: 'degree', columns: [lift], clauses: [number, ...lift.clauses] };
    });
  return [...worked, ...files];
};
