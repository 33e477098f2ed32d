import { describe, expect, it } from 'vitest';
import { getMaterial } from '@/domain/measurement/material';
import { equal, one, zero } from '@/domain/quantity/rational';
import { measureBore } from '@/domain/tappet/measure-bore';
import { degrees, inches } from '../quantity/build';
import { grid, sheet } from './build';

const hot = (over: Parameters<typeof sheet>[0] = {}) =>
  measureBore(
    sheet({
      method: 'absolute',
      lifter: [inches('0.8422')],
      bore: grid([
        ['0.8440', '0.8440'],
        ['0.8440', '0.8440'],
      ]),
      temperatures: { bore: degrees('60 °C'), lifter: degrees('68 °F') },
      ...over,
    }),
  );

describe('clearance at 20 °C (ISO 1)', () => {
  it('takes the growth of a hot block off: 0.8440 ÷ (1 + 11.4e-6 · 40) − 0.8422', () => {
    const found = Number(hot().clearanceAt20C?.mean.text);
    expect(found).toBeCloseTo(0.844 / (1 + 11.4e-6 * 40) - 0.8422, 10);
    expect(hot().clearance?.mean.text).toBe('0.0018');
  });

  it('does the same from a zero on the lifter, and on a ring', () => {
    const expected = hot().clearanceAt20C;
    const bore = grid([
      ['0.0018', '0.0018'],
      ['0.0018', '0.0018'],
    ]);
    expect(hot({ method: 'comparative', bore }).clearanceAt20C).toEqual(expected);
    const onRing = grid([
      ['0.0010', '0.0010'],
      ['0.0010', '0.0010'],
    ]);
    expect(
      hot({ method: 'comparative', zeroSize: inches('0.8430'), bore: onRing }).clearanceAt20C,
    ).toEqual(expected);
  });

  it('changes nothing at 20 °C', () => {
    const temperatures = {
      bore: degrees('20 °C'),
      lifter: degrees('68 °F'),
      gauge: degrees('20 °C'),
    };
    const found = hot({ temperatures });
    for (const figure of ['mean', 'min', 'max'] as const) {
      expect(found.clearanceAt20C?.[figure].text).toBe(found.clearance?.[figure].text);
      expect(
        equal(found.clearanceAt20C?.[figure].value ?? zero, found.clearance?.[figure].value ?? one),
      ).toBe(true);
    }
  });

  it('a warm ring and a warm micrometer are counted apart', () => {
    const mean = (over: Parameters<typeof sheet>[0]) => Number(hot(over).clearanceAt20C?.mean.text);
    const both = { bore: degrees('60 °C'), lifter: degrees('20 °C') };
    // Both diameters are read by the same warm gauge: the difference hardly moves.
    expect(
      mean({ temperatures: { ...both, gauge: degrees('30 °C') } }) - mean({ temperatures: both }),
    ).toBeCloseTo(0.0018 * 11.5e-5, 6);
    const ring = {
      method: 'comparative',
      zeroSize: inches('0.8430'),
      bore: grid([['0.0010']]),
    } as const;
    expect(
      mean({ ...ring, temperatures: { ...both, setting: degrees('30 °C') } }) -
        mean({ ...ring, temperatures: both }),
    ).toBeCloseTo(0.843 * 11.5e-5, 6);
  });

  it('follows the material, bronze bushings too', () => {
    const mean = (bore: string) =>
      Number(
        hot({ materials: { bore: getMaterial(bore), lifter: getMaterial('steel') } }).clearanceAt20C
          ?.mean.text,
      );
    expect(mean('aluminium')).toBeLessThan(mean('bronze'));
    expect(mean('bronze')).toBeLessThan(mean('iron'));
  });

  it('says hold, and refuses only when the limit cannot bear the temperatures’ own uncertainty', () => {
    const window = inches('0.0006');
    expect(hot({ window })).toMatchObject({ temperatureAdvice: 'hold' });
    expect(hot({ window }).warnings.join(' ')).toContain('hold them');
    const cooler = { bore: degrees('24 °C'), lifter: degrees('22 °C') };
    expect(hot({ window, temperatures: cooler })).toMatchObject({ temperatureAdvice: 'correct' });
    const boiling = { bore: degrees('150 °C'), lifter: degrees('22 °C') };
    const refused = hot({ window, temperatures: boiling });
    expect(refused).toMatchObject({ temperatureAdvice: 'refuse' });
    expect(refused.clearance?.mean.text).toBe('0.0018');
  });

  it('cannot without the lifter’s size, and says so', () => {
    const found = hot({ method: 'comparative', lifter: [], bore: grid([['0.0018']]) });
    expect(found.clearanceAt20C).toBeUndefined();
    expect(found.warnings.join(' ')).toContain('cannot be taken to 20 °C');
  });
});
