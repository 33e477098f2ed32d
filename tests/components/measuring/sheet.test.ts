import { describe, expect, it } from 'vitest';
import { assessSheet } from '@/components/measuring/sheet/assess-sheet';
import { askedBy } from '@/components/measuring/sheet/flow/asked';
import { nextStep, type Standing } from '@/components/measuring/sheet/flow/steps';
import { questionOf } from '@/components/measuring/sheet/keys/question';
import { aloud, NOTHING, press, typedNumber } from '@/components/measuring/sheet/keys/typing';
import { partsOf } from '@/components/measuring/sheet/parts';
import { readingRow } from '@/components/measuring/sheet/rows';
import { type SetUp, scaleFor, usualSetUp } from '@/components/measuring/sheet/set-up';
import type { SheetGauge } from '@/components/measuring/sheet/sheet';
import type { PadKey } from '@/components/tappet/keys';
import { TAPPET_RULE_SET } from '@/domain/rulebook/rule-sets/tappet';
import { boreName, positionsOf } from '@/domain/tappet/layout/bore-layout';
import { GENERIC_LAYOUTS } from '@/domain/tappet/layout/generic-layouts';

const type = (keys: string, decimals: number, base?: string) =>
  typedNumber(
    [...keys].reduce(
      (typed, key) =>
        press(
          typed,
          ({ '.': 'point', '-': 'sign', '<': 'erase' }[key] ?? key) as Exclude<PadKey, 'enter'>,
        ),
      NOTHING,
    ),
    decimals,
    base,
  );

describe('typing', () => {
  it.each([
    ['17', 4, '0.0017'],
    ['2', 1, '0.2'],
    ['0', 1, '0.0'],
    ['-2', 1, '-0.2'],
    ['2-', 1, '-0.2'],
    ['-0', 1, '0.0'],
    ['8423', 4, '0.8423'],
    ['.8423', 4, '0.8423'],
    ['.84235', 4, '0.84235'],
    ['1.', 1, '1.0'],
    ['12<7', 4, '0.0017'],
    ['', 4, undefined],
    ['-', 4, undefined],
    ['.', 4, undefined],
  ])('%s with %i decimals implied is %s', (keys, decimals, text) => {
    expect(type(keys, decimals)).toBe(text);
  });

  it.each([
    ['23', '0.8423'],
    ['3', '0.8423'],
    ['8423', '0.8423'],
    ['.8431', '0.8431'],
    // Three digits may be four with one dropped: nothing is completed.
    ['842', '0.0842'],
    ['-23', '-0.0023'],
    ['', undefined],
  ])('%s of a known size of 0.8420 is %s', (keys, text) => {
    expect(type(keys, 4, '0.8420')).toBe(text);
  });

  it('is read back with its sign', () => {
    expect(aloud('0.2', true)).toBe('plus, zero point two');
    expect(aloud('-0.2', true)).toBe('minus, zero point two');
    expect(aloud('0.0', true)).toBe('zero point zero');
  });
});

const gauge = (more: Partial<SheetGauge>): SheetGauge => ({
  id: more.code ?? '',
  code: '',
  name: '',
  kind: 'micrometer',
  division: { text: '0.0001', unit: 'in' },
  calibratedOn: '2026-03-02',
  dueOn: '2027-03-02',
  ...more,
});

const gauges = [
  gauge({ code: 'MC-00', dueOn: '2026-05-01' }),
  gauge({ code: 'MC-01' }),
  gauge({ code: 'DB-07', kind: 'dial-bore-gauge', largerReads: 'plus' }),
  gauge({ code: 'SR-03', kind: 'setting-ring', size: { text: '0.8440', unit: 'in' } }),
];
const setUp: SetUp = { ...usualSetUp(gauges, '2026-07-11'), form: 'full' };

describe('the usual set-up', () => {
  it('takes gauges in calibration, and the unit that they resolve', () => {
    expect(setUp).toMatchObject({ micrometerId: 'MC-01', boreGaugeId: 'DB-07', ringId: 'SR-03' });
    const scale = (quantity: 'tappet-bore-diameter' | 'lifter-body-diameter', at: number) =>
      scaleFor(setUp, quantity, gauges[at]);
    expect(scale('tappet-bore-diameter', 2)).toEqual({
      unit: 'thou',
      shown: '0.001 in',
      decimals: 1,
    });
    expect(scale('lifter-body-diameter', 1)).toEqual({ unit: 'in', shown: 'in', decimals: 4 });
  });

  it('takes gauges that reach what they are for', () => {
    const range = (from: string, to: string) => ({
      range: { from: { text: from, unit: 'in' }, to: { text: to, unit: 'in' } },
    });
    const several = [
      gauge({ code: 'IM-02', ...range('2', '6') }),
      gauge({ code: 'MC-01', ...range('0', '1') }),
      gauge({ code: 'DB-01', kind: 'dial-bore-gauge', ...range('1.4', '2.4') }),
      gauge({ code: 'DB-07', kind: 'dial-bore-gauge', ...range('0.8', '1.0') }),
    ];
    expect(usualSetUp(several, '2026-07-11')).toMatchObject({
      micrometerId: 'MC-01',
      boreGaugeId: 'DB-07',
      otherGaugeId: 'IM-02',
    });
  });

  it('asks about what can hardly be meant, and about nothing else', () => {
    const ask = (value: string, unit: string, comparative: boolean) =>
      questionOf({
        value,
        unit,
        comparative,
        quantity: comparative ? 'tappet-bore-diameter' : 'lifter-body-diameter',
      });
    expect(ask('0.0842', 'in', false)).toContain('less than can be expected');
    expect(ask('17.0', 'thou', true)).toContain('more than can be expected');
    expect(ask('0.8423', 'in', false)).toBeUndefined();
    expect(ask('-1.7', 'thou', true)).toBeUndefined();
  });
});

describe('what comes next', () => {
  const layout = GENERIC_LAYOUTS[0];
  if (layout === undefined) throw new Error('no layout');
  const positions = positionsOf(layout);
  const walk = (chosen: SetUp) => {
    const parts = partsOf(TAPPET_RULE_SET, chosen.form).filter(
      (one) => one.quantity === 'tappet-bore-diameter',
    );
    const [part] = parts;
    const [first] = positions;
    if (part === undefined || first === undefined) throw new Error('nothing to read');
    let standing: Standing = {
      part,
      parts,
      asked: askedBy(chosen, []),
      second: [],
      cursor: { bore: boreName(first), part: part.quantity, set: 1 },
      setUp: chosen,
      positions,
      position: first,
      judged: [],
      outOfReach: new Set(['1 intake']),
    };
    const path: string[] = [];
    for (let i = 0; i < 200; i += 1) {
      const step = nextStep(standing);
      if (step.kind === 'done') break;
      const { position, cursor } = standing;
      if (step.kind === 'opening') {
        path.push('opening');
        const scope =
          chosen.zeroedOn === 'ring' ? `bank ${position.bank}` : `bore ${boreName(position)}`;
        standing = { ...standing, cursor: { ...cursor, run: { id: 'r', scope } } };
      } else if (step.kind === 'closing') {
        path.push('closing');
        standing = { ...standing, cursor: { ...cursor, run: undefined } };
      } else if (step.kind === 'bore') {
        standing = {
          ...standing,
          position: step.to,
          cursor: { ...cursor, bore: boreName(step.to) },
        };
      } else if (step.kind === 'cell') {
        const value = { text: '0.1', unit: 'thou' };
        const base = {
          gauge: gauge({}),
          setUp: chosen,
          gauges,
          value,
          part,
          position,
          cell: step.cell,
        };
        const row = readingRow({ ...base, repeat: 1, set: 1, runId: 'r' });
        path.push(boreName(position));
        standing = { ...standing, judged: [...standing.judged, assessSheet.counting(row)] };
      }
    }
    return path;
  };

  it('on a ring: one opening and one closing zero a bank, every bore but the one out of reach', () => {
    const path = walk({ ...setUp, form: 'screening' });
    const bank = (name: string) =>
      positions
        .filter((one) => one.bank === name)
        .map(boreName)
        .filter((bore) => bore !== '1 intake');
    expect(path).toEqual([
      'opening',
      ...bank('left'),
      'closing',
      'opening',
      ...bank('right'),
      'closing',
    ]);
  });

  it('on the lifter: a zero for every bore, and four readings in a full set', () => {
    const path = walk({ ...setUp, zeroedOn: 'lifter' });
    expect(path.slice(0, 7)).toEqual([
      'opening',
      ...Array(4).fill('1 exhaust'),
      'closing',
      'opening',
    ]);
    expect(path.filter((step) => step === 'closing')).toHaveLength(15);
  });
});
