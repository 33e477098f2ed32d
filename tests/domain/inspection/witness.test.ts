import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { assessInspection } from '@/domain/inspection/assess-inspection';
import { mandatoryReadings } from '@/domain/inspection/witness/mandatory-readings';
import {
  CODE_BYTES,
  type CodeHead,
  joinCodes,
  readingsLines,
  splitIntoCodes,
} from '@/domain/inspection/witness/readings-codes';
import { body, exhaust, foot, reading, record, remark, zero } from './build';

const head: CodeHead = {
  carNumber: '12J',
  className: 'Street Eight',
  event: 'Round 7',
  at: '2026-07-11 22:40',
  inspector: 'Oona Brannick',
  rules: 'ab12cd34',
  chain: '9f3a12cd',
};

const bay = record({
  readings: [
    body('r1', '0.8423', { depth: 'upper' }),
    body('r2', '0.8422', { depth: 'lower' }),
    body('r3', '0.8424', { place: exhaust, depth: 'upper' }),
    body('r4', '0.8424', { place: exhaust, depth: 'lower' }),
    body('r5', '0.8999', { depth: 'upper' }),
    foot('r6', '0.8421', { depth: '', axis: '' }),
    reading('r11', '-0.0016', { method: 'comparative', gaugeId: 'dial', zeroRunId: 'run1' }),
  ],
  zeros: [zero('z10', 'opening', '0'), zero('z12', 'closing', '0.0001')],
  remarks: [
    remark('s20', 'strike', { readingId: 'r5', reason: 'wrong-value' }),
    remark('k21', 'check', { subject: 'tappet-type', answer: { value: 'flat' } }),
    remark('o22', 'own-reading', {
      subject: 'lifter-body-diameter',
      answer: { value: '0.8410 in' },
      reason: 'Wren Halloway',
    }),
  ],
});
const taken = () => mandatoryReadings(assessInspection(bay), bay);

describe('what the competitor’s side takes along', () => {
  it('holds every reading that a mandatory clause stands on, and no advisory or struck one', () => {
    const { groups, checks, readings } = taken();
    expect(readings).toBe(5);
    expect(groups).toEqual([
      {
        label: 'Lifter body diameter',
        unit: 'in',
        gauge: 'MIC',
        zero: '',
        places: ['upper, along', 'lower, along'],
        rows: [
          { position: '1 intake', values: ['0.8423', '0.8422'] },
          { position: '1 exhaust', values: ['0.8424', '0.8424'] },
        ],
      },
      {
        label: 'Lifter foot diameter',
        unit: 'in',
        gauge: 'MIC',
        zero: '',
        places: [''],
        rows: [{ position: '1 intake', values: ['0.8421'] }],
      },
    ]);
    expect(checks).toEqual([{ subject: 'tappet-type', answers: ['flat'] }]);
  });

  it('says the run’s zeros where a mandatory clause stands on a dial', () => {
    const rules = {
      ...bay.rules,
      clauses: bay.rules.clauses.map((row) =>
        row.number === '4.6' ? { ...row, force: 'mandatory' as const } : row,
      ),
    };
    const { groups } = mandatoryReadings(assessInspection({ ...bay, rules }), bay);
    expect(groups.map(({ zero }) => zero)).toContain(
      'zeroed on its lifter: opened 0, closed 0.0001 in',
    );
  });

  it('reads as plain lines with what each clause came to', () => {
    expect(readingsLines(head, taken())).toEqual(
      expect.arrayContaining([
        'Street Eight, Round 7, 2026-07-11 22:40',
        'Lifter body diameter, in, MIC',
        'at upper, along; lower, along',
        '1 intake: 0.8423 0.8422',
        'tappet-type: flat',
        expect.stringMatching(/^4\.2 .*: (pass|no finding|FAIL)$/),
      ]),
    );
  });

  it('never mixes in the competitor’s own reading', () => {
    const without = { ...bay, remarks: bay.remarks.filter(({ kind }) => kind !== 'own-reading') };
    const { findings, bores } = assessInspection(bay);
    const plain = assessInspection(without);
    expect(JSON.stringify(findings)).toBe(JSON.stringify(plain.findings));
    expect(bores.length).toBe(plain.bores.length);
    expect(readingsLines(head, taken()).join()).not.toContain('0.8410');
  });
});

describe('codes', () => {
  const size = (text: string) => new TextEncoder().encode(text).length;

  it('hold the lines within their size, numbered, and give them back in any order', () => {
    const lines = Array.from(
      { length: 40 },
      (_, i) => `${i} intake: ${'0.8423 '.repeat(8).trim()}`,
    );
    const codes = splitIntoCodes(lines, head);
    expect(codes.length).toBeGreaterThan(3);
    expect(codes[0]).toMatch(/^Readings 1\/\d, car 12J, chain 9f3a12cd\n0 intake/);
    expect(codes.every((code) => size(code) <= CODE_BYTES)).toBe(true);
    expect(joinCodes([...codes].reverse())).toEqual(lines);
    expect(joinCodes(codes.slice(1))).toBeUndefined();
    expect(joinCodes(['something else'])).toBeUndefined();
  });

  it('lose no line, whatever stands in them', () => {
    const line = fc
      .string({ minLength: 1, maxLength: 60, unit: 'grapheme' })
      .map((text) => text.replace(/\n/g, ' '));
    fc.assert(
      fc.property(fc.array(line, { minLength: 1, maxLength: 40 }), (lines) => {
        const codes = splitIntoCodes(lines, head, 320);
        expect(codes.every((code) => size(code) <= 320)).toBe(true);
        expect(joinCodes(codes)?.join('')).toBe(lines.join(''));
      }),
      { numRuns: 100 },
    );
  });
});
