import { describe, expect, it } from 'vitest';
import { completenessOf } from '@/domain/tappet/completeness';
import { type BoreLayout, boreName, positionsOf } from '@/domain/tappet/layout/bore-layout';
import { bankOf, GENERIC_LAYOUTS } from '@/domain/tappet/layout/generic-layouts';
import { layoutFaults } from '@/domain/tappet/layout/layout-faults';
import { boresToRedo, mustRedo } from '@/domain/tappet/redo';
import { remediesFor } from '@/domain/tappet/remedies';
import { inches } from '../quantity/build';

const [v8] = GENERIC_LAYOUTS as readonly [BoreLayout, ...BoreLayout[]];

describe('bore layouts', () => {
  it.each(GENERIC_LAYOUTS)('$name can be measured by', (layout) => {
    expect(layoutFaults(layout)).toEqual([]);
    const cylinders = layout.banks.flatMap((bank) => bank.cylinders).length;
    const names = positionsOf(layout).map(boreName);
    expect(names).toHaveLength(2 * cylinders);
    expect(new Set(names).size).toBe(names.length);
  });

  it('keeps the order one meets along a bank', () => {
    expect(positionsOf(v8).slice(0, 4).map(boreName)).toEqual([
      '1 exhaust',
      '1 intake',
      '3 intake',
      '3 exhaust',
    ]);
  });

  it('holds any number of cylinders, and several bores of one valve', () => {
    const twin = bankOf(
      { name: 'block', side: 'middle', offset: 'level', cylinders: [1, 2] },
      'IIEEIIEE',
      4,
    );
    const layout: BoreLayout = { name: 'twin, four valves', viewedFrom: 'rear', banks: [twin] };
    expect(layoutFaults(layout)).toEqual([]);
    expect(positionsOf(layout).map(boreName).slice(0, 4)).toEqual([
      '1 intake 1',
      '1 intake 2',
      '1 exhaust 1',
      '1 exhaust 2',
    ]);
  });

  it('names the faults of a layout by place', () => {
    const bank = { name: 'left', side: 'left', offset: 'level', cylinders: [1, 1, 0] } as const;
    const faults = layoutFaults({
      name: ' ',
      viewedFrom: 'front',
      banks: [{ ...bank, bores: [{ cylinder: 9, valve: 'intake' }] }],
    });
    expect(faults.map((fault) => fault.pointer)).toEqual(
      expect.arrayContaining([
        '/name',
        '/banks',
        '/banks/0/cylinders/2',
        '/banks/0/bores/0',
        '/banks/0/bores',
      ]),
    );
    expect(layoutFaults({ name: 'x', viewedFrom: 'front', banks: [] })).toHaveLength(1);
  });
});

describe('completeness', () => {
  it('names the bores still to measure, and those that are none of this engine', () => {
    const all = positionsOf(v8);
    const wrong = { bank: 'left', cylinder: 12, valve: 'intake' } as const;
    const found = completenessOf(v8, [...all.slice(2), wrong]);
    expect(found).toMatchObject({ complete: false, measured: 14, expected: 16, unknown: [wrong] });
    expect(found.missing.map(boreName)).toEqual(['1 exhaust', '1 intake']);
  });

  it('counts a bore nobody can reach as dealt with, not as measured', () => {
    const [first, ...rest] = positionsOf(v8);
    if (first === undefined) throw new Error('no bore');
    const found = completenessOf(v8, rest, [{ position: first, reason: 'lifter seized' }]);
    expect(found).toMatchObject({ complete: true, measured: 15 });
  });
});

describe('a failed closing zero', () => {
  const division = inches('0.0001').value;
  const zeros = (closing: string) => ({ opening: inches('0'), closing: inches(closing) });

  it('is more than a quarter of the window, or more than a division where there is none', () => {
    const window = inches('0.0006').value;
    expect(mustRedo(zeros('0.00015'), division, window)).toBe(false);
    expect(mustRedo(zeros('-0.00016'), division, window)).toBe(true);
    expect(mustRedo(zeros('0.0001'), division, undefined)).toBe(false);
    expect(mustRedo(zeros('0.00011'), division, undefined)).toBe(true);
    expect(mustRedo({ opening: inches('0') }, division, window)).toBe(false);
  });

  it('names every bore of its run', () => {
    const [a, b, c] = positionsOf(v8);
    if (a === undefined || b === undefined || c === undefined) throw new Error('no bores');
    const runs = [
      { bores: [a, b], zeros: zeros('0.0004') },
      { bores: [c], zeros: zeros('0.0001') },
    ];
    expect(boresToRedo(runs, division, undefined)).toEqual([a, b]);
  });
});

describe('remedies (common practice)', () => {
  const loose = {
    smallestBore: inches('0.8444'),
    largestBore: inches('0.8446'),
    smallestLifter: inches('0.8421'),
    largestLifter: inches('0.8423'),
    min: inches('0.0013'),
    max: inches('0.0019'),
    nominalSizes: ['0.904', '0.842', '0.875'].map(inches),
    allowed: { anotherLifter: true, bush: false, nextSize: null },
  };
  const spans = (bore: typeof loose) =>
    remediesFor(bore).map((remedy) => [
      remedy.kind,
      remedy.from?.text ?? null,
      remedy.to?.text ?? null,
      remedy.allowed,
    ]);

  it('gives each the size it needs and whether the class allows it', () => {
    expect(spans(loose)).toEqual([
      ['another-lifter', '0.8427', '0.8431', true],
      ['bush-back', '0.8436', '0.844', false],
      ['next-nominal-size', '0.8763', '0.8769', null],
    ]);
  });

  it('cautions about running in another lifter', () => {
    expect(remediesFor(loose)[0]?.caution).toContain('run in');
  });

  it('has no lifter for a bore whose own form is more than the window, and no size above the largest', () => {
    expect(
      spans({ ...loose, smallestBore: inches('0.9050'), largestBore: inches('0.9060') }),
    ).toEqual([
      ['another-lifter', null, null, true],
      ['bush-back', '0.8436', '0.844', false],
    ]);
  });
});
