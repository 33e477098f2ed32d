import { HyperFormula } from 'hyperformula';
import { assess } from '@/domain/decision/assess';
import type { LimitRequirement } from '@/domain/decision/requirement';
import { scaledText } from '@/domain/quantity/decimal-text';
import { parseQuantity } from '@/domain/quantity/parse';
import type { Quantity } from '@/domain/quantity/quantity';
import { measureBore } from '@/domain/tappet/measure-bore';
import { readGrid } from '@/domain/tappet/read-grid';

/**
 * Sheets assessed per second: twelve bores of two depths and two axes (48 comparative readings from one
 * pair of zeros), from the texts as typed to clearance, form, budget line by line, and the decision with
 * its sentence for every bore. Beside it a spreadsheet engine does the same sheet in doubles, in three ways:
 * all readings set at once, reading by reading as they are typed, and a sheet opened anew. Rates are per
 * second of processor time, so that other work on the machine does not count; the two are first checked
 * to agree. Usage: npx tsx scripts/bench/sheets.ts [sheets, default 2000]
 */
const sheets = Number(process.argv[2] ?? 2000);
const BORES = 12;

const inches = (text: string): Quantity<'length'> => {
  const read = parseQuantity(text, { dimension: 'length', defaultUnit: 'in' });
  if (!read.ok) throw new Error(read.failure.detail);
  return read.value;
};

const clause: LimitRequirement<'length'> = {
  limits: { min: inches('0.0013'), max: inches('0.0019') },
  decisionRule: { kind: 'guarded-rejection' },
  comparison: { method: 'absolute' },
};
const gauge = { kind: 'dial-bore-gauge', division: inches('0.0001') } as const;

type Readings = readonly (readonly string[])[];

/** Bore by bore, four readings in tenths of a thousandth, made from a counter so that runs are alike. */
const readingsOf = (sheet: number): Readings =>
  Array.from({ length: BORES }, (_, bore) =>
    [0, 1, 2, 3].map((place) =>
      scaledText(BigInt(13 + ((sheet * 7 + bore * 5 + place * 3) % 7)), 4),
    ),
  );

const zeros = { opening: inches('0'), closing: inches('0.0001'), readingsInRun: 4 * BORES };

const assessSheet = (readings: Readings) =>
  readings.map(([a = '', b = '', c = '', d = ''], bore) => {
    const order = [1, 2, 3, 4].map((place) => 4 * bore + place);
    const read = readGrid(
      [
        [a, b],
        [c, d],
      ],
      'in',
      { order },
    );
    if (!read.ok) throw new Error('a reading does not parse');
    const measured = measureBore({
      unit: 'in',
      method: 'comparative',
      lifter: [],
      bore: read.value,
      gauge,
      zeros,
    });
    if (measured.clearance === null) throw new Error('no clearance');
    return { measured, finding: assess(clause, { value: measured.clearance.mean, ...measured }) };
  });

// Columns: A–D readings; E–H freed from drift; I mean, J min, K max; L out-of-round; M–O taper; P–U the
// budget; V u, W U, X ratio, Y probability, Z acceptance, AA assessment, AB complies; AC–AH shares of the
// budget; AI the sentence. Row n is bore n.
const formulas = (row: number): string[] => {
  const freed = ['A', 'B', 'C', 'D'].map(
    (column, place) =>
      `=${column}${row}-(0+(0.0001-0)*${4 * (row - 1) + place + 1}/${4 * BORES + 1})`,
  );
  const at = (column: string) => `${column}${row}`;
  return [
    ...freed,
    `=AVERAGE(${at('E')}:${at('H')})`,
    `=MIN(${at('E')}:${at('H')})`,
    `=MAX(${at('E')}:${at('H')})`,
    `=MAX(ABS(${at('E')}-${at('F')}),ABS(${at('G')}-${at('H')}))`,
    `=ABS(AVERAGE(${at('E')}:${at('F')})-AVERAGE(${at('G')}:${at('H')}))`,
    `=MAX(ABS(${at('E')}-${at('G')}),ABS(${at('F')}-${at('H')}))`,
    `=AVERAGE(${at('E')}:${at('F')})-AVERAGE(${at('G')}:${at('H')})`,
    '=0.00004',
    '=0.0001/SQRT(12)',
    '=0.00005/SQRT(3)',
    '=0.00005/SQRT(3)',
    '=0.0001/2/SQRT(3)',
    '=2/SQRT(3)*0.875*0.0000114',
    `=SQRT(SUMSQ(${at('P')}:${at('U')}))`,
    `=NORM.S.INV(0.975)*${at('V')}`,
    `=0.0006/(2*${at('W')})`,
    `=NORM.S.DIST((0.0019-${at('I')})/${at('V')},TRUE())-NORM.S.DIST((0.0013-${at('I')})/${at('V')},TRUE())`,
    `=0.0019+NORM.S.INV(0.95)*${at('V')}`,
    `=IF(OR(ABS(${at('I')}-0.0019)<=${at('W')},ABS(${at('I')}-0.0013)<=${at('W')}),"too-close",IF(AND(${at('I')}>=0.0013,${at('I')}<=0.0019),"within","outside"))`,
    `=IF(${at('I')}<=${at('Z')},${at('X')}>=2,FALSE())`,
    ...['P', 'Q', 'R', 'S', 'T', 'U'].map((line) => `=${at(line)}^2/${at('V')}^2`),
    `=CONCATENATE("A value breaches this clause only when it lies past the limit by more than its guard band of ",TEXT(ROUNDDOWN(${at('Z')}-0.0019,5),"0.00000")," in (one-sided 95 %): here from ",TEXT(ROUNDUP(0.0013-NORM.S.INV(0.95)*${at('V')},5),"0.00000")," in to ",TEXT(ROUNDDOWN(${at('Z')},5),"0.00000")," in the competitor has the benefit of the doubt.")`,
  ];
};

const rows = (readings: Readings) =>
  readings.map((row, bore) => [...row.map(Number), ...formulas(bore + 1)]);
const opened = (readings: Readings) =>
  HyperFormula.buildFromArray(rows(readings), { licenseKey: 'gpl-v3' });
const engine = opened(readingsOf(0));

const atOnce = (readings: Readings) => {
  engine.setCellContents(
    { sheet: 0, row: 0, col: 0 },
    readings.map((row) => row.map(Number)),
  );
  return engine.getSheetValues(0);
};

const recalculated = (readings: Readings) => {
  engine.batch(() => {
    engine.setCellContents(
      { sheet: 0, row: 0, col: 0 },
      readings.map((row) => row.map(Number)),
    );
  });
  engine.rebuildAndRecalculate();
  return engine.getSheetValues(0);
};

const asTyped = (readings: Readings) => {
  readings.forEach((cells, row) => {
    cells.forEach((text, col) => {
      engine.setCellContents({ sheet: 0, row, col }, Number(text));
    });
  });
  return engine.getSheetValues(0);
};

const openedAnew = (readings: Readings) => {
  const sheet = opened(readings);
  const values = sheet.getSheetValues(0);
  sheet.destroy();
  return values;
};

/** Best of three, in sheets per second of processor time. */
const rate = (work: (readings: Readings) => unknown, count: number): number => {
  const made = Array.from({ length: count }, (_, sheet) => readingsOf(sheet));
  const runs = [0, 1, 2].map(() => {
    const before = process.cpuUsage();
    for (const readings of made) work(readings);
    const { user, system } = process.cpuUsage(before);
    return (count * 1e6) / (user + system);
  });
  return Math.max(...runs);
};

const agree = (): void => {
  const ours = assessSheet(readingsOf(1));
  const theirs = atOnce(readingsOf(1));
  ours.forEach(({ measured, finding }, bore) => {
    const row = theirs[bore] ?? [];
    const mean = Number(measured.clearance?.mean.text);
    const same =
      Math.abs(mean - Number(row[8])) < 1e-9 &&
      Math.abs(measured.standardUncertainty / 0.0254 - Number(row[21])) < 1e-9 &&
      finding.assessment === row[26] &&
      finding.complies === row[27] &&
      finding.sentence === row[34];
    if (!same)
      throw new Error(
        `bore ${bore + 1}: the two sheets differ: ${mean} ${measured.standardUncertainty / 0.0254} ${finding.assessment} ${finding.complies}, ${row.join(' ')}`,
      );
  });
};

agree();
const exact = rate(assessSheet, sheets);
console.info(`exact, full trace             ${exact.toFixed(0)} sheets/s of 48 readings`);
for (const [name, work, count] of [
  ['spreadsheet, recalculated', recalculated, sheets / 20],
  ['spreadsheet, opened anew', openedAnew, sheets / 20],
  ['spreadsheet, as typed', asTyped, sheets / 10],
  ['spreadsheet, set at once', atOnce, sheets],
] as const) {
  const theirs = rate(work, Math.ceil(count));
  console.info(
    `${name.padEnd(30)}${theirs.toFixed(0)} sheets/s; ratio ${(exact / theirs).toFixed(1)}`,
  );
}
engine.destroy();
