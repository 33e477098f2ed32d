import { renderToStaticMarkup } from 'react-dom/server';
import { describe, expect, it } from 'vitest';
import { HoldAdvice } from '@/components/finding/HoldAdvice';
import { Remedies } from '@/components/finding/Remedies';
import { CheckList } from '@/components/paperwork/checks/CheckList';
import { assessInspection } from '@/domain/inspection/assess-inspection';
import { remediesInClass } from '@/domain/inspection/remedies-in-class';
import { body, RULES, reading, record } from '../../domain/inspection/build';

const assessed = (block: string, bore: string) => {
  const temperatures = {
    bore: { text: block, unit: '°C' },
    lifter: { text: '24', unit: '°C' },
  };
  const readings = [body('r1', '0.8423', { temperatures }), reading('r3', bore, { temperatures })];
  return assessInspection(record({ readings }));
};

describe('advice at a bore', () => {
  it('holds a hot block with its correction, and says nothing of a settled one', () => {
    const hot = renderToStaticMarkup(<HoldAdvice bores={assessed('61', '0.8444').bores} />);
    expect(hot).toContain('Hold the parts and measure again');
    // 0.8444 in × 11.4e-6 × 41 K less the lifter’s own 4 K: −0.00036 in.
    expect(hot).toMatch(/1 intake \(−0\.3[56] × 0\.001 in\)/);
    expect(renderToStaticMarkup(<HoldAdvice bores={assessed('24', '0.8444').bores} />)).toBe('');
  });

  it('names remedies with their sizes, and whether the class allows each', () => {
    const { facts, findings } = assessed('24', '0.8446');
    const clause = RULES.clauses.find(({ number }) => number === '4.6');
    if (clause === undefined) throw new Error('no clause');
    const inClass = { clauses: RULES.clauses, results: findings };
    const shown = renderToStaticMarkup(
      <Remedies bores={remediesInClass(clause, inClass, facts)} />,
    );
    expect(shown).toMatch(/^<details><summary>What can be done about this bore<\/summary>/);
    expect(shown).toContain('A run-in flat tappet stays with its lobe');
    expect(shown).toMatch(/0\.8436 to 0\.8442 in\./);
    expect(shown).toContain('The class does not allow it, clause 4.4.');
    expect(shown).toContain('Next nominal size</strong>, 0.875 in.');
    expect(shown).toContain('0.8763 to 0.8769 in.');
  });

  it('stands under the clearance clause in the paperwork’s check, with what its values are worth', () => {
    const { facts, findings } = assessed('24', '0.8446');
    const shown = renderToStaticMarkup(
      <CheckList results={findings} rules={RULES} facts={facts} />,
    );
    expect(shown).toContain('Where ± U comes from in this check');
    expect(shown).toContain('What the uncertainty is made of');
    expect(shown).toMatch(/± 0\.\d\d<\/span> \(k = 1\.96\)/);
    expect(shown.match(/What can be done about this bore/g)).toHaveLength(1);
    expect(shown).toMatch(/Each value against the limit.*<svg.*reading .*max.*, in 0\.001 in/);
    expect(shown).toMatch(/class="note">[^<]*lies past the limit/);
  });
});
