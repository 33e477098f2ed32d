import { describe, expect, it } from 'vitest';
import { asciiIn } from '@/domain/quantity/format';
import { decimalsOf } from '@/domain/quantity/number-text';
import { parseQuantity, parseWritten } from '@/domain/quantity/parse';
import { toNumber } from '@/domain/quantity/rational';
import { typed } from './build';

const refusal = (text: string, dimension: Parameters<typeof typed>[0], defaultUnit?: string) => {
  const read = parseQuantity(text, { dimension, defaultUnit });
  return read.ok ? `taken as ${read.value.text} ${read.value.unit}` : read.failure;
};

describe('what people write for a length', () => {
  it.each([
    ['.0017', '0.0017000'],
    ['0.0017 in', '0.0017000'],
    ['1.7 thou', '0.0017000'],
    ['17 tenths', '0.0017000'],
    ['17tenths', '0.0017000'],
    ['1700 µin', '0.0017000'],
    ['0.0017"', '0.0017000'],
    ['0.0017 in.', '0.0017000'],
    ['0.0017 IN', '0.0017000'],
    ['1.7E-03', '0.0017000'],
    ['0.043 mm', '0.0016929'],
    ['0,0431 mm', '0.0016969'],
    ['0,0431', '0.0431000'],
    [',0431', '0.0431000'],
    ['-0.0002', '-0.0002000'],
    ['−0.0002', '-0.0002000'],
    ['–0.0002', '-0.0002000'],
    ['+.0002', '0.0002000'],
    ['1.234', '1.2340000'],
    ['1,234.5 mm', '48.6023622'],
    ['1.234,5 mm', '48.6023622'],
    ["1'234.5 mm", '48.6023622'],
    ['1 234,5 mm'.replace(' ', '\u00a0'), '48.6023622'],
    ['1,234,567 µm', '48.6050000'],
    ['0,431 mm', '0.0169685'],
  ])('%s is %s in', (text, expected) => {
    expect(asciiIn(typed('length', text, 'in'), 'in', 7)).toBe(expected);
  });

  it('keeps the digits as typed, and reads the resolution off them', () => {
    expect(typed('length', ' 0.8440 in ')).toMatchObject({ text: '0.8440', unit: 'in' });
    expect(typed('length', '0,0431 mm')).toMatchObject({ text: '0,0431', unit: 'mm' });
    expect(
      ['0.8440', '.0017', '12', '12.', '0,0431', '1.7E-03', '−0.0002'].map(decimalsOf),
    ).toEqual([4, 4, 0, 0, 4, 4, 4]);
  });

  it.each([
    [
      '1,234',
      'ambiguous',
      '1,234 could be 1.234 or 1234. Write it with a decimal point, or without the comma.',
    ],
    [
      '12,345',
      'ambiguous',
      '12,345 could be 12.345 or 12345. Write it with a decimal point, or without the comma.',
    ],
    ['', 'empty', 'Nothing is written here.'],
    ['3/8', 'not-a-number', '"3/8" is a fraction. Write it as a decimal.'],
    [
      '0.8440 0.8442',
      'not-a-number',
      '"0.8440 0.8442" looks like two numbers. Write one value here.',
    ],
    [
      '0.0013-0.0019',
      'not-a-number',
      '"0.0013-0.0019" looks like two numbers. Write one value here.',
    ],
    [
      '0.0017 ± 0.0001',
      'not-a-number',
      '"0.0017 ± 0.0001" looks like two numbers. Write one value here.',
    ],
    ['1e99', 'not-a-number', '"1e99" is not a number.'],
    ['1e12', 'impossible', '1e12 in is too large to have been measured.'],
    ['n/a', 'not-a-number', '"n/a" is not a number.'],
    ['1.2.3', 'not-a-number', '"1.2.3" is not a number.'],
    ['1,234,5', 'not-a-number', '"1,234,5" is not a number.'],
    ['--2', 'not-a-number', '"--2" is not a number.'],
    ['5 lb', 'wrong-dimension', '"lb" measures a weight; a length is wanted.'],
    ['60 °C', 'wrong-dimension', '"°C" measures a temperature; a length is wanted.'],
  ])('refuses %j as %s, in words', (text, name, detail) => {
    expect(refusal(text, 'length', 'in')).toEqual({ name, detail });
  });

  it('asks for a unit where none is settled', () => {
    expect(refusal('17', 'length')).toEqual({
      name: 'unit-missing',
      detail: '17 of what? Write the unit: in, thou, tenths, µin.',
    });
    expect(refusal('17 foo', 'length')).toMatchObject({ name: 'unit-unknown' });
  });

  it('refuses a text that is too long to be a reading', () => {
    expect(refusal('1'.repeat(61), 'length', 'in')).toMatchObject({ name: 'not-a-number' });
  });
});

describe('other dimensions', () => {
  it.each([
    ['angle', "104°30'", 104.5],
    ['angle', '104° 30′', 104.5],
    ['angle', '104 deg 30 min', 104.5],
    ['angle', '−7° 30′ 15″', -7.504166666666666],
    ['angle', '104.5°', 104.5],
    ['angle', "30'", 0.5],
    ['temperature', '60 °C', 333.15],
    ['temperature', '140 °F', 333.15],
    ['temperature', '140F', 333.15],
    ['temperature-difference', '9 °F', 5],
    ['ratio', '9.5:1', 9.5],
    ['ratio', '1.5', 1.5],
    ['ratio', '56 %', 0.56],
    ['force', '1 lb', 4.4482216152605],
    ['pressure', '1 psi', 6894.757293168361],
    ['volume', '1 cu in', 0.000016387064],
    ['volume', '1 cu. in.', 0.000016387064],
    ['mass', '1 lb', 0.45359237],
    ['stiffness', '1 lbf/in', 175.12683524647636],
    ['count', '8', 8],
  ] as const)('%s %s', (dimension, text, base) => {
    expect(toNumber(typed(dimension, text).value)).toBeCloseTo(base, 10);
  });

  it('refuses what cannot be', () => {
    expect(refusal('-500 °F', 'temperature')).toMatchObject({ name: 'impossible' });
    expect(refusal('3.5', 'count')).toMatchObject({ name: 'impossible' });
    expect(refusal("104°75'", 'angle')).toHaveProperty('name');
    expect(refusal('150 kg', 'force')).toMatchObject({ name: 'wrong-dimension' });
  });

  it('reads the wire form by its own unit and refuses a unit of another dimension', () => {
    expect(parseWritten({ text: '1.7', unit: 'thou' }, 'length')).toMatchObject({ ok: true });
    expect(parseWritten({ text: '1.7', unit: 'lb' }, 'length')).toMatchObject({ ok: false });
  });
});
