import { create } from 'qrcode';
import { describe, expect, it } from 'vitest';
import { nonCompliancePrinter } from '@/adapters/pdf/part/non-compliance-printer';
import { tagPrinter } from '@/adapters/pdf/part/tag-printer';
import { type HeldPart, tagCode } from '@/domain/inspection/custody/tag';
import { findNonCompliance } from '@/domain/verdict/non-compliance';
import { readReport } from '@/domain/verdict/report-view';
import { readPdf } from '../../support/pdf-text';
import { BIG_FEET, reportText, STREET_EIGHT } from '../../support/verdict-case';

const part: HeldPart = {
  tag: 'T-0007',
  kind: 'held',
  carNumber: '12J',
  event: 'Round 7',
  words: 'Lifter',
  placeOnEngine: 'intake 3',
  clause: '4.3',
  bag: 'B-11',
  takenFrom: 'Wren Halloway',
  takenBy: 'Ilse Törnkvist',
  takenAt: '2026-07-12T03:40:00.000Z',
  hash: 'ab'.repeat(32),
};
const code = tagCode('https://tags.example/barn/parts/01900000-0000-7000-8000-000000000000', part);
const tag = { part, series: 'Corran Valley', zone: 'America/Chicago', code };

describe('a tag', () => {
  it.each(['label', 'a4'] as const)(
    'prints its text on %s, the same bytes every time',
    async (paper) => {
      const bytes = await tagPrinter.print({ ...tag, paper });
      const { text, pages } = readPdf(bytes);
      const words = text.replace(/\s+/g, ' ');
      for (const said of [
        'T-0007',
        '12J',
        'Lifter',
        'intake 3',
        '4.3',
        'B-11',
        'Ilse Törnkvist',
        'Wren Halloway',
        '11 July, 22:40',
        part.hash,
      ])
        expect(words).toContain(said);
      expect(pages).toBe(1);
      expect(Buffer.from(await tagPrinter.print({ ...tag, paper })).equals(bytes)).toBe(true);
    },
  );

  it('fits a code that a phone can read off a label of 100 mm', () => {
    const { modules } = create(code, { errorCorrectionLevel: 'M' });
    // 39 mm across: at least half a millimetre a module.
    expect(39 / modules.size).toBeGreaterThan(0.5);
  });
});

describe('a report of non-compliance', () => {
  const sheetOf = (text: string) => {
    const report = readReport(text);
    if (!report.ok) throw new Error(report.failure.detail);
    const head = {
      series: 'Corran Valley',
      className: 'Street Eight',
      event: 'event 7, Quarrel Fen Oval',
      zone: 'America/Chicago',
      car: '12J',
      competitor: 'Wren Halloway',
      revision: '1',
      reason: '',
      reportHash: 'cd'.repeat(32),
      rulesHash: 'ef'.repeat(32),
    };
    return findNonCompliance(report.value, STREET_EIGHT, head, () => undefined);
  };

  it('is nothing where every mandatory clause is kept, advisory ones apart', () => {
    expect(sheetOf(reportText({ clearances: { '7 intake': '-0.0024' } }))).toBeUndefined();
  });

  it('names clause, quantity, datum, readings, uncertainty and gauge', async () => {
    const sheet = sheetOf(reportText(BIG_FEET));
    if (sheet === undefined) throw new Error('nothing failed');
    expect(sheet.clauses.map(({ clause }) => clause.number)).toEqual(['4.3']);
    const [at] = sheet.clauses;
    expect(at?.measurand).toMatch(/of each lifter/);
    expect(
      at?.clause.positions.map(({ position, uncertainty, k }) => [position, uncertainty?.unit, k]),
    ).toEqual(['3 exhaust', '5 exhaust', '6 exhaust'].map((position) => [position, 'in', '1.96']));
    expect(new Set(at?.readings.map(({ gauge }) => gauge))).toEqual(new Set(['MIC']));
    expect(at?.readings.map(({ value }) => value.text)).toContain('0.8485');
    const bytes = await nonCompliancePrinter.print({ sheet, url: 'https://tags.example/x' });
    const { text } = readPdf(bytes);
    const words = text.replace(/\s+/g, ' ');
    for (const said of [
      'Report of non-compliance',
      '4.3',
      'of each lifter',
      '0.8485 in',
      'MIC',
      'C-mic',
      'k = 1.96',
      'Oona Brannick',
      'Wren Halloway',
      '1 of ',
    ])
      expect(words).toContain(said);
    expect(
      Buffer.from(
        await nonCompliancePrinter.print({ sheet, url: 'https://tags.example/x' }),
      ).equals(bytes),
    ).toBe(true);
  });
});
