import { describe, expect, it } from 'vitest';
import { declaredFacts } from '@/domain/paperwork/declared-facts';
import type { DeclaredReading } from '@/domain/paperwork/document';
import { withUsualUncertainty } from '@/domain/paperwork/usual-uncertainty';
import { evaluateRules } from '@/domain/rulebook/evaluate/evaluate-rules';
import type { QuantityName } from '@/domain/rulebook/quantity-catalogue';
import { TAPPET_RULE_SET } from '@/domain/rulebook/rule-sets/tappet';
import { GENERIC_LAYOUTS } from '@/domain/tappet/layout/generic-layouts';

const layout = GENERIC_LAYOUTS[0]!;

const reading = (quantity: QuantityName, text: string): DeclaredReading => ({
  position: '1 intake',
  quantity,
  depth: '',
  axis: '',
  value: { text, unit: 'in' },
});

const facts = (...readings: readonly DeclaredReading[]) =>
  withUsualUncertainty(
    declaredFacts({
      engine: { layout },
      answers: [
        { subject: 'displacement', position: 'engine', written: { text: '361.4', unit: 'in³' } },
      ],
      sheets: [{ subject: 'lifter-sheet', readings }],
      photographs: [],
      files: [],
    }),
  );

const at = (number: string, ...readings: readonly DeclaredReading[]) =>
  evaluateRules({ clauses: TAPPET_RULE_SET.clauses, waivers: [] }, facts(...readings), {})
    .find((result) => result.clause === number)
    ?.perPosition.find((row) => row.position === '1 intake');

describe('a declared clearance with the uncertainty of usual gauges', () => {
  // The flat tappet window 0.0013 to 0.0019 in and the gauges' half-widths are common practice.
  it('is too close to call at the limit, with U, its k and what it is made of', () => {
    const found = at(
      '4.6',
      reading('tappet-bore-diameter', '0.8441'),
      reading('lifter-body-diameter', '0.8422'),
    );
    expect(found).toMatchObject({ state: 'too-close', coverageFactor: '1.96' });
    expect(found?.uncertainty?.text).toMatch(/^0\.00013/);
    expect(found?.budget?.length).toBeGreaterThan(3);
  });

  it('is within in the middle of the window and outside well past it', () => {
    const bore = (text: string) =>
      at('4.6', reading('tappet-bore-diameter', text), reading('lifter-body-diameter', '0.8422'));
    expect(bore('0.8438')?.state).toBe('within');
    expect(bore('0.8445')?.state).toBe('outside');
  });

  it('does not ask whether a gauge nobody named is fit', () => {
    const found = at('4.2', reading('lifter-body-diameter', '0.8423'));
    expect(found?.fit).toBeNull();
    expect(found?.state).not.toBe('no-statement');
  });

  it('leaves other numbers without', () => {
    expect(
      facts().numbers.find(({ quantity }) => quantity === 'displacement')?.standardUncertainty,
    ).toBe(0);
  });
});
