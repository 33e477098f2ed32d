import { describe, expect, it } from 'vitest';
import { bearable, temperatureAdvice } from '@/domain/measurement/hold';
import { bushed, findMaterial, getMaterial, MATERIALS } from '@/domain/measurement/material';
import {
  at20,
  growth,
  readBy,
  temperatureComponents,
  thermalChange,
  thermalChangeOfVolume,
} from '@/domain/measurement/temperature';
import { combine } from '@/domain/measurement/uncertainty';
import {
  compare,
  equal,
  fromDecimalText,
  mul,
  one,
  rational,
  sub,
  toNumber,
} from '@/domain/quantity/rational';
import { checkValue, provenance } from '../../support/check-value';
import { degrees, inches } from '../quantity/build';

const alpha = (name: string) => toNumber(getMaterial(name).coefficient);

describe('thermal expansion', () => {
  const table = checkValue('cte-callister');
  it(`coefficients: ${provenance(table)}`, () => {
    const published = table.expected as Record<string, number>;
    expect(alpha('iron') * 1e6).toBeCloseTo(published['gray_iron_G3000'] ?? 0, 9);
    expect(alpha('ductile') * 1e6).toBeCloseTo(published['ductile_60_40_18'] ?? 0, 9);
    expect(alpha('aluminium') * 1e6).toBeCloseTo(published['Al_356'] ?? 0, 9);
    const steel = getMaterial('steel');
    for (const grade of ['steel_1040', 'steel_4140']) {
      const off = Math.abs((published[grade] ?? 0) * 1e-6 - toNumber(steel.coefficient));
      expect(off, grade).toBeLessThanOrEqual(toNumber(steel.halfWidth) + 1e-18);
    }
  });

  const perDegree = checkValue('cte-f-to-c');
  it(`per °F to per °C: ${provenance(perDegree)}`, () => {
    const perF = fromDecimalText(String(perDegree.inputs['per_degF']));
    const perC = mul(perF, rational(9n, 5n));
    expect(toNumber(perC)).toBeCloseTo(perDegree.expected['per_degC'] as number, 12);
    // The iron of that table lies at the edge of the half-width taken here.
    const iron = getMaterial('iron');
    expect(compare(sub(iron.coefficient, iron.halfWidth), perC)).toBe(0);
  });

  const wire = checkValue('cte-copper-wire');
  it(`a length: ${provenance(wire)}`, () => {
    const { L_m, alpha: a, T1, T2 } = wire.inputs as Record<string, number>;
    const found = thermalChange(L_m ?? 0, a ?? 0, (T2 ?? 0) - (T1 ?? 0));
    expect(Math.abs(found - (wire.expected['dL_m'] as number))).toBeLessThan(
      wire.tolerance as number,
    );
  });

  const rule = checkValue('thermal-per-10C');
  it(`per 10 °C: ${provenance(rule)}`, () => {
    const { diameter_in = 0, dT_C = 0 } = rule.inputs as Record<string, number>;
    expect(thermalChange(diameter_in, alpha('iron'), dT_C)).toBeCloseTo(
      rule.expected['iron_in'] as number,
      12,
    );
    expect(thermalChange(diameter_in, alpha('aluminium'), dT_C)).toBeCloseTo(
      rule.expected['al356_in'] as number,
      12,
    );
  });

  const volume = checkValue('thermal-volume');
  it(`a volume: ${provenance(volume)}`, () => {
    const { V_cc = 0, alpha: a = 0, dT = 0 } = volume.inputs as Record<string, number>;
    const found = thermalChangeOfVolume(V_cc, a, dT);
    expect(Math.abs(found - (volume.expected['dV_cc'] as number))).toBeLessThan(
      volume.tolerance as number,
    );
  });

  it('a block 40 °C hot is about 0.0004 in large (common practice)', () => {
    const hot = { temperature: degrees('60 °C'), material: getMaterial('iron') };
    const cold = at20(inches('0.8440').value, hot);
    const large = toNumber(sub(inches('0.8440').value, cold)) / 0.0254;
    expect(large).toBeGreaterThan(0.00035);
    expect(large).toBeLessThan(0.00045);
  });

  it('is exact: at 20 °C nothing changes, and a gauge as warm as its part of the same metal reads right', () => {
    const steel = getMaterial('steel');
    expect(equal(growth({ temperature: degrees('68 °F'), material: steel }), one)).toBe(true);
    const warm = { temperature: degrees('35 °C'), material: steel };
    const size = inches('0.8422').value;
    expect(equal(at20(readBy(size, warm), warm), size)).toBe(true);
  });
});

describe('materials', () => {
  it('by name or coefficient', () => {
    expect(findMaterial('Aluminum')).toBe(findMaterial('aluminium'));
    expect(findMaterial('cast iron')?.name).toBe('iron');
    expect(toNumber(findMaterial('11.4e-6')?.coefficient ?? one)).toBe(11.4e-6);
    expect(findMaterial('0.0000114')).toBeDefined();
    expect(findMaterial('unobtainium')).toBeUndefined();
    expect(findMaterial('11.4')).toBeUndefined();
  });

  it('a bushed bore reaches from the block’s coefficient to the bushing’s', () => {
    const bronzeInIron = bushed(getMaterial('iron'), getMaterial('bronze'));
    const low = sub(bronzeInIron.coefficient, bronzeInIron.halfWidth);
    expect(toNumber(low)).toBeCloseTo(10.8e-6, 12);
    expect(toNumber(bronzeInIron.coefficient)).toBeCloseTo(14.9e-6, 12);
    for (const material of MATERIALS) expect(material.halfWidth.n > 0n).toBe(true);
  });
});

describe('hold and re-measure before refusal', () => {
  const flat = bearable(0.0006 * 0.0254, 2);
  const roller = bearable(0.001 * 0.0254, 2);
  const size = inches('0.8440').value;
  const advice = (temperature: string, bears: number, name = 'iron') => {
    const block = { temperature: degrees(temperature), material: getMaterial(name) };
    const correction = toNumber(sub(at20(size, block), size));
    return temperatureAdvice(
      correction,
      temperatureComponents(toNumber(size), block, 'the block'),
      bears,
    );
  };

  it('weighs the correction and its own uncertainty against what the limit can bear', () => {
    expect(advice('25 °C', flat)).toBe('correct');
    expect(advice('60 °C', flat)).toBe('hold');
    expect(advice('200 °C', flat)).toBe('refuse');
    expect(advice('120 °C', flat, 'aluminium')).toBe('refuse');
  });

  it('a wider window bears more', () => {
    expect(advice('40 °C', flat)).toBe('hold');
    expect(advice('40 °C', roller)).toBe('correct');
  });

  it('adds two lines, and none of expansion at 20 °C', () => {
    const warmth = { temperature: degrees('20 °C'), material: getMaterial('iron') };
    const [expansion, temperature] = temperatureComponents(toNumber(size), warmth, 'the block');
    expect(combine(expansion ? [expansion] : []).standardUncertainty).toBe(0);
    expect(temperature?.words).toBe('the block’s temperature');
  });
});
