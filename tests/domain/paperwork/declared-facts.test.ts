import { describe, expect, test } from 'vitest';
import { declaredFacts } from '@/domain/paperwork/declared-facts';
import type { DeclaredReading } from '@/domain/paperwork/document';
import { evaluateRules } from '@/domain/rulebook/evaluate/evaluate-rules';
import type { QuantityName } from '@/domain/rulebook/quantity-catalogue';
import { TAPPET_RULE_SET } from '@/domain/rulebook/rule-sets/tappet';
import { GENERIC_LAYOUTS } from '@/domain/tappet/layout/generic-layouts';

const layout = GENERIC_LAYOUTS[0]!;

const reading = (position: string, quantity: QuantityName, text: string): DeclaredReading => ({
  position,
  quantity,
  depth: '',
  axis: '',
  value: { text, unit: 'in' },
});

const declared = (readings: readonly DeclaredReading[]) => ({
  engine: { layout },
  answers: [
    { subject: 'tappet-type', position: 'engine', value: 'flat' },
    { subject: 'bore-bushed', position: 'engine', value: 'no' },
    { subject: 'displacement', position: 'engine', written: { text: '361.4', unit: 'in³' } },
  ],
  sheets: [{ subject: 'lifter-sheet', readings }],
  photographs: [],
  files: [],
});

const clause = (readings: readonly DeclaredReading[], number: string) =>
  evaluateRules(
    { clauses: TAPPET_RULE_SET.clauses, waivers: [] },
    declaredFacts(declared(readings)),
    {
      carNumber: '12J',
    },
  ).find((result) => result.clause === number)!;

describe('a declaration held against the rules', () => {
  // Common practice (the trade's flat tappet window 0.0013 to 0.0019 in): 0.8440 − 0.8422 = 0.0018 exactly.
  test('clearance of a bore is its diameter less its lifter’s, exactly', () => {
    const facts = declaredFacts(
      declared([
        reading('3 exhaust', 'tappet-bore-diameter', '0.8440'),
        reading('3 exhaust', 'lifter-body-diameter', '0.8422'),
      ]),
    );
    const found = facts.numbers.find((fact) => fact.quantity === 'tappet-clearance');
    expect(found?.value.text).toBe('0.0018');
    expect(found?.position).toBe('3 exhaust');
  });

  test('a loose bore warns and disqualifies nobody', () => {
    const result = clause(
      [
        reading('3 exhaust', 'tappet-bore-diameter', '0.8444'),
        reading('3 exhaust', 'lifter-body-diameter', '0.8422'),
      ],
      '4.6',
    );
    const bore = result.perPosition.find((row) => row.position === '3 exhaust');
    expect(bore?.state).toBe('outside');
    expect(bore?.pass).toBeNull();
    expect(bore?.value).toEqual({ text: '0.0022', unit: 'in' });
  });

  test('an oversize foot breaches the clause on feet', () => {
    const result = clause(
      [
        reading('1 intake', 'foot-diameter', '0.8440'),
        reading('1 intake', 'lifter-body-diameter', '0.8423'),
      ],
      '4.3',
    );
    expect(result.perPosition.find((row) => row.position === '1 intake')?.pass).toBe(false);
  });

  test('several readings at one bore give mean, smallest and largest', () => {
    const facts = declaredFacts(
      declared([
        { ...reading('1 intake', 'lifter-body-diameter', '0.8422'), depth: 'top' },
        { ...reading('1 intake', 'lifter-body-diameter', '0.8424'), depth: 'foot' },
      ]),
    );
    const found = facts.numbers.filter((fact) => fact.quantity === 'lifter-body-diameter');
    expect(found.map((fact) => [fact.figure, fact.value.text])).toEqual([
      ['mean', '0.8423'],
      ['smallest', '0.8422'],
      ['largest', '0.8424'],
    ]);
  });

  test('an answer for the whole engine serves every bore, and a sheet with readings is evidence', () => {
    const facts = declaredFacts(declared([reading('1 intake', 'lifter-body-diameter', '0.8422')]));
    expect(facts.evidence).toEqual(['lifter-sheet']);
    expect(clause([], '4.4').state).toBe('complies');
    expect(clause([], '5.2').perPosition[0]?.state).toBe('not-measured');
  });

  test('displacement is worked out from bores and stroke where it was not declared', () => {
    const facts = declaredFacts({
      ...declared([
        ...[1, 2, 3, 4, 5, 6, 7, 8].map((cylinder) =>
          reading(String(cylinder), 'cylinder-bore', '4.000'),
        ),
        reading('engine', 'stroke', '3.500'),
      ]),
      answers: [],
    });
    const found = facts.numbers.find((fact) => fact.quantity === 'displacement');
    // π/4 × 4.000² × 3.500 × 8 = 351.858…
    expect(Number(found?.value.text)).toBeCloseTo(351.858, 3);
  });
});
