import { describe, expect, test } from 'vitest';
import { declaredFacts } from '@/domain/paperwork/declared-facts';
import { againstLastFound, foundBefore } from '@/domain/paperwork/last-found';
import type { QuantityName } from '@/domain/rulebook/quantity-catalogue';
import { readReport } from '@/domain/verdict/report-view';
import { BIG_FEET, reportText, STREET_EIGHT, V8 } from '../../support/verdict-case';

const report = readReport(reportText(BIG_FEET));
if (!report.ok) throw new Error(report.failure.detail);
const found = foundBefore(report.value.findings, STREET_EIGHT.clauses);

const declared = (values: readonly (readonly [string, QuantityName, string])[]) =>
  declaredFacts({
    engine: { layout: V8 },
    answers: [],
    sheets: [
      {
        subject: 'lifter-sheet',
        readings: values.map(([position, quantity, text]) => ({
          position,
          quantity,
          depth: '',
          axis: '',
          value: { text, unit: 'in' },
        })),
      },
    ],
    photographs: [],
    files: [],
  });

const compared = (values: Parameters<typeof declared>[0]) =>
  againstLastFound(declared(values), { found }).map(
    ({ quantity, position, differs }) =>
      `${position} ${quantity} ${differs ? 'differs' : 'agrees'}`,
  );

describe('what is declared beside the last teardown', () => {
  test('every limit of the report gives its number at each bore, with its uncertainty', () => {
    expect(new Set(found.map(({ quantity }) => quantity))).toEqual(
      new Set(['lifter-body-diameter', 'foot-less-body', 'tappet-clearance']),
    );
    expect(found.filter(({ quantity }) => quantity === 'tappet-clearance')).toHaveLength(16);
    expect(found.every(({ uncertainty }) => uncertainty !== undefined)).toBe(true);
  });

  test('a value as it was found agrees; one beyond its uncertainty differs', () => {
    expect(compared([['3 exhaust', 'lifter-body-diameter', '0.8423']])).toEqual([
      '3 exhaust lifter-body-diameter agrees',
    ]);
    expect(compared([['3 exhaust', 'lifter-body-diameter', '0.8443']])).toEqual([
      '3 exhaust lifter-body-diameter differs',
    ]);
  });

  test('what is worked out from two readings is compared too: the loose bore declared tight', () => {
    // Found: 0.0024 in at 7 intake. Declared: 0.8439 − 0.8423 = 0.0016 in.
    expect(
      compared([
        ['7 intake', 'lifter-body-diameter', '0.8423'],
        ['7 intake', 'tappet-bore-diameter', '0.8439'],
      ]),
    ).toEqual(['7 intake lifter-body-diameter agrees', '7 intake tappet-clearance differs']);
  });

  test('nothing declared, nothing compared', () => {
    expect(compared([])).toEqual([]);
  });
});
