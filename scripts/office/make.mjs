import { mkdirSync, mkdtempSync, renameSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { Problem } from '../set-up/problem.mjs';
import { run, tail } from '../set-up/run.mjs';
import { expectedOf, flatSpreadsheet } from './flat-sheet.mjs';
import { SHAPES } from './shapes.mjs';

/** @typedef {import('./shapes.mjs').Csv} Csv */

const CHARACTER_SETS = { 'utf-8': 76, 'windows-1252': 1, 'utf-16': 65_535 };
const LANGUAGES = { en: 1033, de: 1031 };

/**
 * LibreOffice's CSV filter: delimiter, quotation mark, character set, first line, no column formats,
 * language, quote only what needs it, then as the sheet shows it.
 *
 * @param {Csv} csv
 */
const filterOf = ({ delimiter, encoding, locale }) =>
  `csv:Text - txt - csv (StarCalc):${delimiter.charCodeAt(0)},34,${CHARACTER_SETS[encoding]},1,,${LANGUAGES[locale]},false,true,true`;

/**
 * @param {string} program
 * @param {string} profile
 * @param {string} filter
 * @param {string} folder where the files go
 * @param {readonly string[]} files
 */
async function convert(program, profile, filter, folder, files) {
  const { code, output } = await run(
    program,
    [
      `-env:UserInstallation=file://${profile}`,
      '--headless',
      '--norestore',
      '--convert-to',
      filter,
      '--outdir',
      folder,
      ...files,
    ],
    // Formats without a language of their own, dates among them, follow the account's.
    { env: { ...process.env, LC_ALL: 'C.UTF-8', HOME: profile } },
  );
  if (code !== 0)
    throw new Problem(
      `LibreOffice could not make the sheets:\n${tail(output, 8)}`,
      'Look at the lines above, then run it again.',
    );
}

/** What each file must be read as, by its name. */
const expectations = () =>
  Object.fromEntries(
    SHAPES.flatMap((shape) => {
      const sheet = shape.sheets[shape.read ?? 0];
      if (sheet === undefined) throw new Error(`${shape.name} has no such sheet.`);
      const { what, columns = {} } = shape;
      const book = {
        what,
        columns,
        notes: shape.notes ?? [],
        cells: expectedOf(sheet, shape.sheets.length > 1),
      };
      const text = {
        ...book,
        notes: shape.csvNotes ?? shape.notes ?? [],
        cells: expectedOf(sheet, false),
      };
      return [
        /** @type {const} */ ([`${shape.name}.xlsx`, book]),
        ...shape.csv.map(
          ({ suffix }) => /** @type {const} */ ([`${shape.name}${suffix}.csv`, text]),
        ),
      ];
    }),
  );

/**
 * Makes every shape with LibreOffice, as XLSX and as CSV, and writes beside them what they must be read as.
 *
 * @param {string} program
 * @param {string} folder
 */
export async function makeSheets(program, folder) {
  mkdirSync(folder, { recursive: true });
  const work = mkdtempSync(join(tmpdir(), 'tagwire-office-'));
  try {
    const profile = join(work, 'profile');
    for (const { name, sheets, locale = 'en' } of SHAPES)
      writeFileSync(join(work, `${name}.fods`), flatSpreadsheet(sheets, locale));
    const sources = SHAPES.map(({ name }) => join(work, `${name}.fods`));
    await convert(program, profile, 'xlsx:Calc MS Excel 2007 XML', folder, sources);
    for (const { name, csv } of SHAPES) {
      for (const one of csv) {
        const made = join(work, 'csv');
        await convert(program, profile, filterOf(one), made, [join(work, `${name}.fods`)]);
        renameSync(join(made, `${name}.csv`), join(folder, `${name}${one.suffix}.csv`));
      }
    }
    writeFileSync(join(folder, 'expected.json'), `${JSON.stringify(expectations(), null, 1)}\n`);
  } finally {
    rmSync(work, { recursive: true, force: true, maxRetries: 5 });
  }
}
