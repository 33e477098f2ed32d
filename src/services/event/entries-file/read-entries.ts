import type { EntryRow } from '@/contracts/event/event';
import { findLapSeconds, lapsIn } from '@/domain/event/lap-time';
import {
  type ColumnChoices,
  FIELD_WORDS,
  type Field,
  LAP_COLUMNS,
  lapColumns,
  NEEDED,
  plainHead,
} from './columns';
import type { FileFault, Table } from './read-table';

export interface EntriesRead {
  readonly rows: readonly (EntryRow & { readonly line: number })[];
  readonly faults: readonly FileFault[];
}

export interface KnownClass {
  readonly id: string;
  readonly name: string;
  readonly slug: string;
}

/** Where nobody finished: did not finish, did not start, disqualified, a stroke. */
const NO_POSITION = /^(|[-–—]|dnf|dns|dq|dsq|nc)$/i;

/** The entries of a table by the columns that were chosen: each fault by its line, every other line read. */
export const readEntries = (
  table: Table,
  choices: ColumnChoices,
  known: {
    readonly classes: readonly KnownClass[];
    /** The class of a line that names none. */
    readonly usualClass: string | undefined;
    readonly newId: () => string;
  },
): EntriesRead => {
  const missing = NEEDED.filter((field) => choices[field] === undefined);
  if (missing.length > 0)
    return {
      rows: [],
      faults: missing.map((field) => ({
        line: table.headLine,
        detail: `Choose which column is “${FIELD_WORDS[field]}”.`,
      })),
    };
  const heads = table.heads.map(plainHead);
  const laps = lapColumns(table.heads);
  const rows: (EntryRow & { line: number })[] = [];
  const faults: FileFault[] = [];
  for (const { line, cells } of table.rows) {
    const cell = (field: Field): string => {
      const name = choices[field];
      return name === undefined ? '' : (cells[heads.indexOf(name)] ?? '').trim();
    };
    const before = faults.length;
    const say = (detail: string) => faults.push({ line, detail });
    const carNumber = cell('carNumber').toUpperCase().replace(/^#\s*/, '');
    if (!/^[0-9A-Z]{1,6}$/.test(carNumber))
      say(`“${cell('carNumber')}” is no car number: one to six digits and letters.`);
    const wanted = cell('className').toLowerCase();
    const found = known.classes.find((one) =>
      wanted === ''
        ? one.id === known.usualClass
        : one.name.toLowerCase() === wanted || one.slug === wanted,
    );
    if (found === undefined)
      say(
        wanted === ''
          ? 'The class is missing. Choose one for lines that name none.'
          : `“${cell('className')}” is no class of this season. Write ${known.classes.map((one) => `“${one.name}”`).join(' or ')}.`,
      );
    const competitorName = cell('competitor');
    if (competitorName === '' || competitorName.length > 120)
      say('The competitor’s name is missing or too long.');
    if (cell('driver').length > 120) say('The driver’s name is too long.');
    const written = cell('position');
    const position = /^0*([1-9]\d{0,2})\.?$/.exec(written)?.[1];
    if (position === undefined && !NO_POSITION.test(written))
      say(`“${written}” is no finishing position.`);
    const times: string[] =
      choices.laps === LAP_COLUMNS
        ? laps.map((at) => (cells[at] ?? '').trim()).filter((text) => text !== '')
        : [...lapsIn(cell('laps'))];
    for (const [at, text] of times.entries())
      if (findLapSeconds(text) === undefined) say(`Lap ${at + 1}, “${text}”, is no lap time.`);
    if (times.length > 500) say('At most 500 laps.');
    const twice = rows.find((row) => row.carNumber === carNumber && row.classId === found?.id);
    if (twice !== undefined) say(`Car ${carNumber} stands on line ${twice.line} already.`);
    if (faults.length > before || found === undefined) continue;
    rows.push({
      line,
      id: known.newId(),
      classId: found.id,
      carNumber,
      competitorName,
      ...(cell('email') === '' ? {} : { competitorEmail: cell('email') }),
      engineReference: cell('engine').slice(0, 40),
      position: position === undefined ? null : Number(position),
      ...(cell('driver') === '' ? {} : { driver: cell('driver') }),
      ...(times.length === 0 ? {} : { laps: times }),
    });
  }
  return { rows, faults };
};
