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
 * its sentence for every bore. Beside it a spreadsheet engine recalculates the same sheet in doubles:
 * the same readings set, the same figures read back. Usage: npx tsx scripts/bench/sheets.ts [sheets, default 2000]
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
// budget; V u, W U, X ratio, Y probability, Z acceptance, AA assessment, AB complies. Row n is bore n.
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
  ];
};

const engine = HyperFormula.buildFromArray(
  Array.from({ length: BORES }, (_, bore) => [0, 0, 0, 0, ...formulas(bore + 1)]),
  { licenseKey: 'gpl-v3' },
);

const recalculate = (readings: Readings) => {
  engine.setCellContents(
    { sheet: 0, row: 0, col: 0 },
    readings.map((row) => row.map(Number)),
  );
  return engine.getSheetValues(0);
};

/** Best of three, in sheets per second. */
const rate = (work: (readings: Readings) => unknown, count: number): number => {
  const made = Array.from({ length: count }, (_, sheet) => readingsOf(sheet));
  const runs = [0, 1, 2].map(() => {
    const start = process.hrtime.bigint();
    for (const readings of made) work(readings);
    return (count * 1e9) / Number(process.hrtime.bigint() - start);
  });
  return Math.max(...runs);
};

const agree = (): void => {
  const ours = assessSheet(readingsOf(1));
  const theirs = recalculate(readingsOf(1));
  ours.forEach(({ measured, finding }, bore) => {
    const row = theirs[bore] ?? [];
    const mean = Number(measured.clearance?.mean.text);
    const same =
      Math.abs(mean - Number(row[8])) < 1e-9 &&
      Math.abs(measured.standardUncertainty / 0.0254 - Number(row[21])) < 1e-9 &&
      finding.assessment === row[26] &&
      finding.complies === row[27];
    if (!same)
      throw new Error(
        `bore ${bore + 1}: the two sheets differ: ${mean} ${measured.standardUncertainty / 0.0254} ${finding.assessment} ${finding.complies}, ${row.join(' ')}`,
      );
  });
};

agree();
const exact = rate(assessSheet, sheets);
const spreadsheet = rate(recalculate, Math.max(1, Math.floor(sheets / 10)));
console.info(`exact, full trace     ${exact.toFixed(0)} sheets/s (48 readings each)`);
console.info(`spreadsheet engine    ${spreadsheet.toFixed(0)} sheets/s`);
console.info(`ratio                 ${(exact / spreadsheet).toFixed(1)}`);
engine.destroy();
