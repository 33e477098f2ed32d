import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { roundArea } from '@/domain/engine/area';
import {
  clearanceVolume,
  compressionRatio,
  ratioOfVolumes,
} from '@/domain/engine/compression-ratio';
import { compressionHeight } from '@/domain/engine/deck';
import type { Input } from '@/domain/engine/derived';
import { displacement, roundedForComparison, roundedUp } from '@/domain/engine/displacement';
import { springLoad, springRate } from '@/domain/engine/spring';
import { rateOfWire } from '@/domain/engine/spring-wire';
import { weightDistribution } from '@/domain/engine/weights';
import { convert } from '@/domain/quantity/convert';
import type { Dimension } from '@/domain/quantity/dimension';
import { parseQuantity } from '@/domain/quantity/parse';
import { compareQuantities, type Quantity } from '@/domain/quantity/quantity';
import { fromDecimalText, toNumber } from '@/domain/quantity/rational';
import { checkValue, provenance } from '../../support/check-value';

const of = <D extends Dimension>(dimension: D, text: string): Quantity<D> => {
  const parsed = parseQuantity(text, { dimension });
  if (!parsed.ok) throw new Error(parsed.failure.detail);
  return parsed.value;
};
const length = (text: string, u?: number): Input<'length'> => ({
  value: of('length', text),
  standardUncertainty: u === undefined ? undefined : u * 0.0254,
});
const inches = (x: unknown) => length(`${String(x)} in`);
const cc = (x: unknown): Input<'volume'> => ({ value: of('volume', `${String(x)} cc`) });
const number = (quantity: Quantity, unit = quantity.unit) => Number(convert(quantity, unit).text);
const near = (found: number, expected: number, tolerance: number): void => {
  expect(Math.abs(found - expected), `${found} against ${expected}`).toBeLessThanOrEqual(tolerance);
};
const of301 = displacement({ bores: [inches(4)], stroke: inches(4), cylinders: 6 });

describe('displacement', () => {
  const printed = checkValue('disp-301');
  it(`4 × 4, six cylinders (${provenance(printed)}; printed with π/4 = 0.7854, here with π: 301.592895 in³, 4942.2221 cc)`, () => {
    near(number(of301.value), 301.592895, 5e-7);
    near(number(of301.value, 'cc'), 4942.2221, 5e-5);
    near(number(of301.value), printed.expected['cid'] as number, 0.001);
  });

  for (const id of ['disp-273', 'disp-radial-1830']) {
    const check = checkValue(id);
    it(`${id} (${provenance(check)})`, () => {
      const { bore_in, stroke_in, cyl } = check.inputs as Record<string, number>;
      const found = displacement({
        bores: [inches(bore_in)],
        stroke: inches(stroke_in),
        cylinders: cyl ?? 0,
      });
      near(number(found.value), check.expected['cid'] as number, check.tolerance as number);
    });
  }

  const limit = checkValue('disp-limit-362');
  const asLimit = displacement({
    bores: [inches(limit.inputs['bore_max_in'])],
    stroke: inches(limit.inputs['stroke_in']),
    cylinders: 8,
  }).value;
  it(`a limit from the largest bore is rounded up (${provenance(limit)})`, () => {
    near(number(asLimit), 361.310192, 5e-7);
    expect(roundedUp(asLimit).text).toBe(String(limit.expected['limit_cid']));
  });

  it('rounding the limit and rounding the measured value give different answers, as the rule says', () => {
    const measured = of('volume', '361.9 in³');
    const byLimit = roundedForComparison(measured, asLimit, 'limit');
    expect(compareQuantities(byLimit.measured, byLimit.limit)).toBe(-1);
    const byMeasured = roundedForComparison(measured, asLimit, 'measured');
    expect(byMeasured.measured.text).toBe('362');
    expect(compareQuantities(byMeasured.measured, byMeasured.limit)).toBe(1);
  });

  it('a whole number is not rounded up any further', () => {
    expect(roundedUp(of('volume', '362 in³')).text).toBe('362');
    expect(roundedUp(of('volume', '362.0000000001 in³')).text).toBe('363');
  });

  it('bores one by one: the sum of the cylinders, and independent errors add in squares', () => {
    const one = displacement({ bores: [length('4 in', 0.001)], stroke: inches(3), cylinders: 4 });
    const four = displacement({
      bores: Array.from({ length: 4 }, () => length('4 in', 0.001)),
      stroke: inches(3),
      cylinders: 4,
    });
    expect(four.value.text).toBe(one.value.text);
    // dV/db = π/2·b·s a cylinder; one common error counts four times, four independent ones twice.
    const each = (Math.PI / 2) * 4 * 3 * 0.001 * 0.0254 ** 3;
    near((one.standardUncertainty ?? 0) / (4 * each), 1, 1e-9);
    near((four.standardUncertainty ?? 0) / (2 * each), 1, 1e-9);
  });

  it('says no uncertainty when no input states one', () => {
    expect(of301.standardUncertainty).toBeUndefined();
    expect(of301.datum).toContain('dead centre');
  });
});

describe('compression ratio', () => {
  const simple = checkValue('cr-9-237');
  it(`from volumes (${provenance(simple)})`, () => {
    const found = ratioOfVolumes(fromDecimalText('823.7'), fromDecimalText('100'));
    near(toNumber(found), simple.expected['CR'] as number, 0.0005);
  });

  const check = checkValue('cr-constructed');
  const x = check.inputs;
  const chamber = {
    bore: inches(x['bore_in']),
    stroke: inches(x['stroke_in']),
    chamber: cc(x['chamber_cc']),
    piston: cc(x['piston_dish_cc(+)/dome(-)']),
    deck: inches(x['deck_clearance_in']),
    gasketBore: inches(x['gasket_bore_in']),
    gasketThickness: inches(x['gasket_thick_in']),
  };
  it(`the whole stack (${provenance(check)})`, () => {
    const found = compressionRatio(chamber);
    near(number(found.value), check.expected['CR'] as number, 1e-9);
    near(number(found.swept), check.expected['swept_cc'] as number, 1e-9);
    near(number(found.clearance), check.expected['clearance_cc'] as number, 1e-9);
  });
  it('a dome takes volume away and raises the ratio', () => {
    const domed = compressionRatio({ ...chamber, piston: cc(-6) });
    expect(number(domed.value)).toBeGreaterThan(number(compressionRatio(chamber).value));
  });
  it('a piston that fills the chamber has no ratio', () => {
    const filled = { ...chamber, piston: cc(-90) };
    expect(clearanceVolume(filled).n < 0n).toBe(true);
    expect(() => compressionRatio(filled)).toThrow(RangeError);
  });
  it('the uncertainty of the chamber: dR = −swept/clearance² · u (JCGM 100:2008, 5.1.2)', () => {
    const found = compressionRatio({
      ...chamber,
      chamber: { value: of('volume', '64 cc'), standardUncertainty: 0.2e-6 },
    });
    const expected = (727.411842875092 / 83.66334563879616 ** 2) * 0.2;
    near((found.standardUncertainty ?? 0) / expected, 1, 1e-4);
  });
});

describe('areas, springs, weights, deck', () => {
  const restrictor = checkValue('restrictor-area');
  it(`area of a round hole (${provenance(restrictor)})`, () => {
    const found = roundArea([inches(restrictor.inputs['d_in'])]);
    near(number(found.value), restrictor.expected['A_in2'] as number, 1e-6);
    expect(found.value.unit).toBe('in²');
  });

  const force = (text: string): Input<'force'> => ({ value: of('force', text) });
  const shigley = checkValue('spring-shigley');
  it(`rate from wire and coils (${provenance(shigley)})`, () => {
    const { d_in, OD_in, Na, G_psi } = shigley.inputs;
    const found = rateOfWire({
      wire: inches(d_in),
      outside: inches(OD_in),
      activeCoils: { value: of('ratio', String(Na)) },
      shearModulus: { value: of('pressure', `${String(G_psi)} psi`) },
    });
    near(number(found.value, 'lbf/in'), shigley.expected['k_lbf_in'] as number, 0.02);
  });

  const pair = [
    { height: inches('1.700'), load: force('120 lbf') },
    { height: inches('1.200'), load: force('310 lbf') },
  ];
  it('rate and load from two heights: (310 − 120) ÷ 0.5 = 380 lbf/in (constructed)', () => {
    expect(springRate(pair).value).toMatchObject({ text: '380', unit: 'lbf/in' });
    expect(springLoad(pair, of('length', '1.250 in')).value).toMatchObject({
      text: '291',
      unit: 'lbf',
    });
  });
  it('three points on one line keep its rate; a metric pair answers in N/mm', () => {
    const third = { height: inches('1.450'), load: force('215 lbf') };
    expect(springRate([...pair, third]).value.text).toBe('380');
    const metric = springRate([
      { height: length('40 mm'), load: force('300 N') },
      { height: length('30 mm'), load: force('650 N') },
    ]);
    expect(metric.value).toMatchObject({ text: '35', unit: 'N/mm' });
  });
  it('one height only holds no rate', () => {
    expect(() => springRate([pair[0]!, pair[0]!])).toThrow(RangeError);
  });

  const left = checkValue('weight-left-limit');
  it(`total and left share (${provenance(left)})`, () => {
    const corner = (key: string) => ({ value: of('mass', `${String(left.inputs[key])} lb`) });
    const found = weightDistribution({
      leftFront: corner('LF'),
      rightFront: corner('RF'),
      leftRear: corner('LR'),
      rightRear: corner('RR'),
    });
    expect(found.total.value.text).toBe(String(left.expected['total']));
    near(number(found.left.value), left.expected['left_pct'] as number, 1e-4);
    near(number(found.cross.value), (100 * (700 + 790)) / 3010, 1e-9);
    near(number(found.rear.value), (100 * (790 + 620)) / 3010, 1e-9);
    expect(compareQuantities(found.total.value, of('mass', '3000 lb')) >= 0).toBe(
      left.expected['total_ok'],
    );
    expect(compareQuantities(found.left.value, of('ratio', '56 %')) <= 0).toBe(
      left.expected['left_ok'],
    );
  });
  it('the scale’s error hardly moves a share, and fully moves the total', () => {
    const corner = (text: string) => ({ value: of('mass', text), standardUncertainty: 0.5 });
    const found = weightDistribution({
      leftFront: corner('400 kg'),
      rightFront: corner('400 kg'),
      leftRear: corner('400 kg'),
      rightRear: corner('400 kg'),
    });
    near(found.total.standardUncertainty ?? 0, 1, 1e-9);
    near(found.left.standardUncertainty ?? 0, 1 / 3200, 1e-7);
  });

  const deck = checkValue('deck-height');
  it(`compression height (${provenance(deck)})`, () => {
    const found = compressionHeight({
      deckHeight: inches(deck.inputs['deck']),
      rod: inches(deck.inputs['rod']),
      stroke: inches(deck.inputs['stroke']),
      deckClearance: inches(deck.inputs['deck_clr']),
    });
    expect(found.value.text).toBe(String(deck.expected['comp_height']));
  });
});

describe('propagation', () => {
  it('agrees with the derivative of the displacement for any size (JCGM 100:2008, 5.1.2)', () => {
    const size = fc.integer({ min: 2000, max: 6000 }).map((n) => n / 1000);
    fc.assert(
      fc.property(size, size, fc.integer({ min: 1, max: 16 }), (bore, stroke, cylinders) => {
        const found = displacement({
          bores: [length(`${bore} in`, 0.0002)],
          stroke: length(`${stroke} in`, 0.0005),
          cylinders,
        });
        const volume = (Math.PI / 4) * bore ** 2 * stroke * cylinders * 0.0254 ** 3;
        const expected = volume * Math.hypot((2 * 0.0002) / bore, 0.0005 / stroke);
        return Math.abs((found.standardUncertainty ?? 0) / expected - 1) < 1e-6;
      }),
    );
  });
});
