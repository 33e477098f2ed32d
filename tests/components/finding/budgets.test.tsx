import { renderToStaticMarkup } from 'react-dom/server';
import { describe, expect, it } from 'vitest';
import { Budgets } from '@/components/finding/Budgets';

const dial = [
  { words: 'The dial’s division is most of it.', share: '85' },
  { words: 'Setting the zero is a sixth of it.', share: '15' },
];
const other = [{ words: 'The hand’s repeatability is nearly all of it.', share: '100' }];

describe('what an uncertainty is made of', () => {
  it('opens without script, names positions with the same budget together, largest line first', () => {
    const shown = renderToStaticMarkup(
      <Budgets
        results={[
          { position: '1 intake', budget: dial },
          { position: '1 exhaust', budget: other },
          { position: '3 intake', budget: dial },
        ]}
      />,
    );
    expect(shown).toMatch(/^<details><summary>What the uncertainty is made of<\/summary>/);
    expect(shown).toContain('1 intake, 3 intake');
    expect(shown.match(/The dial’s division/g)).toHaveLength(1);
    expect(shown.indexOf('dial’s division')).toBeLessThan(shown.indexOf('Setting the zero'));
    expect(shown).not.toContain('style=');
  });

  it('shows nothing for values that keep no budget', () => {
    expect(renderToStaticMarkup(<Budgets results={[{ position: 'engine' }]} />)).toBe('');
  });
});
