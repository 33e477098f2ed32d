import { describe, expect, it } from 'vitest';
import { assessInspection, type InspectionRecord } from '@/domain/inspection/assess-inspection';
import { checkAsksOf } from '@/domain/inspection/plan/check-asks';
import { placesFor } from '@/domain/inspection/plan/places';
import { findAsk, planOf } from '@/domain/inspection/plan/plan';
import type { Clause } from '@/domain/rulebook/clause';
import type { RulesInForce } from '@/domain/rulebook/rules-in-force';
import { body, exhaust, RULES, reading, record, remark } from './build';

const planFor = (more: Partial<InspectionRecord> = {}, advice = false) => {
  const whole = record(more);
  return planOf(whole.rules, assessInspection(whole), { advice });
};

const changed = (number: string, change: (clause: Clause) => Clause): RulesInForce => ({
  ...RULES,
  clauses: RULES.clauses.map((clause) => (clause.number === number ? change(clause) : clause)),
});

const limitWith = (more: object) => (clause: Clause) =>
  ({ ...clause, requirement: { ...clause.requirement, ...more } }) as Clause;

describe('the plan', () => {
  it('screens first: one reading of each number that a mandatory clause needs, advice left out', () => {
    const plan = planFor();
    expect(plan.map(({ quantity, position }) => `${quantity} ${position}`)).toEqual([
      'cylinder-bore 1',
      'stroke engine',
      'lifter-body-diameter 1 intake',
      'lifter-body-diameter 1 exhaust',
      'foot-diameter 1 intake',
      'foot-diameter 1 exhaust',
      'valve-lift 1 intake',
      'valve-lift 1 exhaust',
    ]);
    expect(new Set(plan.map(({ extent, why }) => `${extent} ${why}`))).toEqual(
      new Set(['one screening']),
    );
    expect(findAsk(plan, 'lifter-body-diameter', '1 intake')?.clause).toBe('4.2');
  });

  it('takes advisory clauses up only where they are wanted', () => {
    const plan = planFor({}, true);
    expect(findAsk(plan, 'tappet-bore-diameter', '1 intake')).toMatchObject({
      extent: 'one',
      why: 'advice',
      clause: '4.6',
    });
    expect(findAsk(planFor(), 'tappet-bore-diameter', '1 intake')).toBeUndefined();
  });

  it.each([
    // 4.2 permits 0.8416 to 0.8426; U of one micrometer reading is 0.0001.
    ['0.8421', 'one', 'screening'],
    ['0.8424', 'one', 'screening'],
    ['0.8425', 'full', 'near-limit'],
    ['0.8426', 'full', 'near-limit'],
    ['0.8440', 'full', 'near-limit'],
    ['0.8416', 'full', 'near-limit'],
  ])('after a body of %s asks %s there and one everywhere else', (text, extent, why) => {
    const plan = planFor({ readings: [body('b1', text)] });
    expect(findAsk(plan, 'lifter-body-diameter', '1 intake')).toMatchObject({ extent, why });
    expect(findAsk(plan, 'lifter-body-diameter', '1 exhaust')).toMatchObject({ extent: 'one' });
  });

  it('asks the full sheet where a mandatory clause needs form or an extreme', () => {
    const largest = planFor({ rules: changed('4.2', limitWith({ figure: 'largest' })) });
    expect(findAsk(largest, 'lifter-body-diameter', '1 exhaust')).toMatchObject({
      extent: 'full',
      why: 'clause-asks-all',
    });
    const taper = changed('4.6', (clause) => ({
      ...limitWith({ quantity: 'bore-taper', figure: undefined })(clause),
      force: 'mandatory',
    }));
    expect(findAsk(planFor({ rules: taper }), 'tappet-bore-diameter', '1 intake')).toMatchObject({
      extent: 'full',
      clause: '4.6',
    });
  });

  it('of a sample asks no more places than the clause counts, those already read first', () => {
    const rules = changed('4.2', limitWith({ sample: { kind: 'some', count: 1 } }));
    const bodies = (more: Partial<InspectionRecord>) =>
      planFor({ rules, ...more })
        .filter(({ quantity, clause }) => quantity === 'lifter-body-diameter' && clause === '4.2')
        .map(({ position }) => position);
    expect(bodies({})).toEqual(['1 intake']);
    expect(bodies({ readings: [body('b1', '0.8421', { place: exhaust })] })).toContain('1 exhaust');
  });

  it('follows the way that was begun: lobe lift and ratio instead of lift at the valve', () => {
    const lobe = reading('l1', '0.3000', { quantity: 'lobe-lift', depth: '', axis: '' });
    const names = planFor({ readings: [lobe] }).map(({ quantity }) => quantity);
    expect(names).toContain('rocker-ratio');
    expect(names).not.toContain('valve-lift');
  });

  it('a struck reading is near nothing', () => {
    const readings = [body('b1', '0.8440')];
    const remarks = [remark('s2', 'strike', { readingId: 'b1', reason: 'wrong-value' })];
    expect(
      findAsk(planFor({ readings, remarks }), 'lifter-body-diameter', '1 intake'),
    ).toMatchObject({ extent: 'one' });
  });
});

describe('checks without numbers', () => {
  it('are asked once for the engine or once a bore, until answered or out of reach', () => {
    const remarks = [
      remark('c1', 'check', { subject: 'bore-bushed', place: exhaust, answer: { value: 'no' } }),
    ];
    const asks = checkAsksOf(RULES, assessInspection(record({ remarks })).facts);
    expect(
      asks.map(({ subject, position, answer }) => `${subject} ${position} ${answer ?? '?'}`),
    ).toEqual([
      'block-casting-number engine ?',
      'tappet-type engine ?',
      'bore-bushed 1 intake ?',
      'bore-bushed 1 exhaust no',
    ]);
    const gone = [remark('n1', 'not-reached', { place: exhaust, reason: 'broken bolt' })];
    const left = checkAsksOf(RULES, assessInspection(record({ remarks: gone })).facts);
    expect(left.map(({ position }) => position)).toEqual(['engine', 'engine', '1 intake']);
  });
});

describe('the cells of an extent', () => {
  it('are one, two depths by two axes, or with a third axis in a lifter’s bore only', () => {
    expect(placesFor('tappet-bore-diameter', 'one')).toEqual([{ depth: 'above', axis: 'along' }]);
    expect(placesFor('tappet-bore-diameter', 'full')).toHaveLength(4);
    expect(placesFor('tappet-bore-diameter', 'third-axis')).toHaveLength(6);
    expect(placesFor('lifter-body-diameter', 'third-axis')).toHaveLength(4);
    expect(placesFor('stroke', 'full')).toEqual([{ depth: '', axis: '' }]);
  });
});
