import { describe, expect, it } from 'vitest';
import { fastestLap, findLapSeconds, lapsIn } from '@/domain/event/lap-time';

describe('a lap time', () => {
  it.each([
    ['17.482', 17482n, 1000n],
    ['17,482', 17482n, 1000n],
    ['1:02.300', 62300n, 1000n],
    ['1:02,3', 623n, 10n],
    ['12:00', 720n, 1n],
    ['61', 61n, 1n],
    ['0.001', 1n, 1000n],
  ])('%s is exact', (text, n, d) => {
    const { n: got, d: over } = findLapSeconds(text) ?? { n: 0n, d: 1n };
    expect(got * d).toBe(n * over);
  });

  it.each([
    '',
    '0',
    '0.000',
    'DNF',
    '1:62.1',
    '1:2',
    '17.4.8',
    '-17.2',
    '17s',
    '1:02:03',
    '17.1234567',
  ])('%j is none', (text) => {
    expect(findLapSeconds(text)).toBeUndefined();
  });

  it('parts a cell by blanks, semicolons and strokes, never by a decimal comma', () => {
    expect(lapsIn('17,482 17,501;  17,399|18,000')).toEqual([
      '17,482',
      '17,501',
      '17,399',
      '18,000',
    ]);
  });

  it('is the fastest by its exact value, as it was written, the first of equals', () => {
    expect(fastestLap(['17.50', '1:17.1', '17,5', 'x', '17.500'])).toBe('17.50');
    expect(fastestLap(['17.4000001', '17.400'])).toBe('17.400');
    expect(fastestLap([])).toBeUndefined();
  });
});
