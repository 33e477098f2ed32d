import { renderToStaticMarkup } from 'react-dom/server';
import { describe, expect, it } from 'vitest';
import { HoldAdvice } from '@/components/finding/HoldAdvice';
import { joinRows } from '@/components/measuring/sheet/recorded';
import { chanceFrom } from '@/demo/make/chance';
import { trueEngine } from '@/demo/make/engine';
import { lifterRows, runRows } from '@/demo/make/measure';
import { assessInspection } from '@/domain/inspection/assess-inspection';
import { positionsOf } from '@/domain/tappet/layout/bore-layout';
import { at, GAUGES, record, TWIN } from '../../domain/inspection/build';

/** The demo's engine measured on a ring, its block this warm. */
const measured = (block: string | undefined) => {
  let second = 0;
  let made = 0;
  const take = {
    uuid: () => {
      made += 1;
      return `row-${made}`;
    },
    next: () => {
      second += 1;
      return at(second);
    },
    gauges: { micrometer: 'mic', boreGauge: 'minus', ring: 'ring', insideMicrometer: 'mic' },
  };
  const bores = trueEngine(positionsOf(TWIN), chanceFrom(88));
  const rows = [
    ...lifterRows(bores, take),
    ...runRows(bores, take, { closing: true, ...(block === undefined ? {} : { bore: block }) }),
  ];
  const dial = {
    kind: 'dial-bore-gauge',
    largerReads: 'plus',
    id: 'minus',
    code: 'DB-07',
  } as const;
  const gauges = [...GAUGES, dial];
  const none = { readings: [], zeros: [], remarks: [] };
  const kept = joinRows(none, rows, 'inspector', 0);
  return assessInspection(record({ ...kept, gauges })).bores;
};

const clearance = (bores: ReturnType<typeof measured>, how: 'clearance' | 'clearanceAt20C') =>
  Number(bores[0]?.sets[0]?.measurement[how]?.mean.text);

describe('the demo’s hot block', () => {
  it('reads large as iron at 61 °C does, and comes back to what it is at 20 °C', () => {
    const settled = clearance(measured(undefined), 'clearance');
    const hot = measured('61');
    expect(clearance(hot, 'clearance') - settled).toBeCloseTo(0.0004, 6);
    expect(Math.abs(clearance(hot, 'clearanceAt20C') - settled)).toBeLessThan(0.0001);
  });

  it('is to be held and measured again, every bore of it', () => {
    const shown = renderToStaticMarkup(<HoldAdvice bores={measured('61')} />);
    expect(shown).toContain('Hold the parts and measure again');
    expect(shown).toMatch(/1 intake \(−0\.\d+ × 0\.001 in\), 1 exhaust \(−0\.\d+ × 0\.001 in\)/);
    expect(renderToStaticMarkup(<HoldAdvice bores={measured(undefined)} />)).toBe('');
  });
});
