import { renderToStaticMarkup } from 'react-dom/server';
import { describe, expect, it } from 'vitest';
import { LimitFields } from '@/components/rulebook/editor/requirement/LimitFields';
import type { LimitRequirement } from '@/domain/rulebook/limit';
import { inches, limit } from '@/domain/rulebook/rule-sets/rule-set';

const body = (more: Partial<LimitRequirement> = {}) =>
  limit({
    quantity: 'lifter-body-diameter',
    unit: 'in',
    per: 'lifter',
    figure: 'mean',
    max: inches('0.8426'),
    ...more,
  });

const chosen = (rule: LimitRequirement): string | undefined => {
  const markup = renderToStaticMarkup(<LimitFields value={rule} onChange={() => undefined} />);
  const [, after] = markup.split('Two sets of one place');
  return after && /<option value="(\w+)" selected/.exec(after)?.[1];
};

describe('what a limit wants of two sets', () => {
  it('is asked for parts, pooled unless it says otherwise', () => {
    expect(chosen(body())).toBe('pooled');
    expect(chosen(body({ twoSets: 'each' }))).toBe('each');
  });

  it('is not asked for a whole car', () => {
    const weight = limit({
      quantity: 'car-weight',
      unit: 'lb',
      per: 'car',
      datum: 'with the driver',
      min: { text: '2600', unit: 'lb' },
    });
    expect(chosen(weight)).toBeUndefined();
  });
});
