import { renderToStaticMarkup } from 'react-dom/server';
import { describe, expect, it } from 'vitest';
import { BoreMap } from '@/components/tappet/BoreMap';
import { neighbour, placeBores, planOf } from '@/components/tappet/map/plan';
import { frames, project, stepOfKey } from '@/components/tappet/map/projection';
import type { BoreLayout } from '@/domain/tappet/layout/bore-layout';
import { bankOf } from '@/domain/tappet/layout/generic-layouts';

const eight: BoreLayout = {
  name: 'eight',
  viewedFrom: 'front',
  banks: [
    bankOf({ name: 'A', side: 'right', offset: 'ahead', cylinders: [1, 3, 5, 7] }, 'EIIEEIIE'),
    bankOf({ name: 'B', side: 'left', offset: 'behind', cylinders: [2, 4, 6, 8] }, 'EIIEEIIE'),
  ],
};
/** The same engine as someone at its rear would write it down. */
const eightFromRear: BoreLayout = {
  name: 'eight',
  viewedFrom: 'rear',
  banks: [
    bankOf({ name: 'A', side: 'left', offset: 'behind', cylinders: [7, 5, 3, 1] }, 'EIIEEIIE'),
    bankOf({ name: 'B', side: 'right', offset: 'ahead', cylinders: [8, 6, 4, 2] }, 'EIIEEIIE'),
  ],
};
const inlineSix: BoreLayout = {
  name: 'six',
  viewedFrom: 'front',
  banks: [
    bankOf(
      { name: 'block', side: 'middle', offset: 'level', cylinders: [1, 2, 3, 4, 5, 6] },
      'EIEIEIEIEIEI',
    ),
  ],
};

describe('the plan of a layout', () => {
  it('is the same engine, whichever end it was described from', () => {
    const places = (layout: BoreLayout) =>
      placeBores(planOf(layout), 1000)
        .bores.map(({ key, u, v }) => `${key} ${u.toFixed(3)} ${v}`)
        .sort();
    expect(places(eightFromRear)).toEqual(places(eight));
  });

  it('puts the bank seen on the right from the front on the left of the plan', () => {
    const first = placeBores(planOf(eight), 1000).bores[0];
    expect(first).toMatchObject({ key: '1 exhaust', v: -1 });
  });

  it('keeps the bores of a row apart and within the length', () => {
    for (const layout of [eight, inlineSix]) {
      const { bores, rows } = placeBores(planOf(layout), 600);
      for (const { v } of rows) {
        const row = bores.filter((bore) => bore.v === v);
        row.forEach((bore, at) => {
          const next = row[at + 1];
          if (next !== undefined) expect(next.u - bore.u).toBeGreaterThanOrEqual(bore.pitch - 1e-9);
          expect(bore.u - bore.pitch / 2).toBeGreaterThanOrEqual(0);
          expect(bore.u + bore.pitch / 2).toBeLessThanOrEqual(600);
        });
      }
    }
  });

  it('draws the bank that is ahead nearer to the front', () => {
    const { bores } = placeBores(planOf(eight), 1000);
    const at = (key: string) => bores.find((bore) => bore.key === key)?.u ?? Number.NaN;
    expect(at('1 exhaust')).toBeLessThan(at('2 exhaust'));
  });
});

describe('the two views', () => {
  it('are a quarter turn apart and never a mirror', () => {
    // Handedness of (towards the rear, to the right): its sign survives a turn and flips in a mirror.
    const handedness = (view: 'front-up' | 'front-left' | 'mini') => {
      const [o, rear, right] = [
        [0, 0],
        [1, 0],
        [0, 1],
      ].map(([u = 0, v = 0]) => project(frames[view], view, u, v)) as [
        { x: number; y: number },
        { x: number; y: number },
        { x: number; y: number },
      ];
      return (rear.x - o.x) * (right.y - o.y) - (rear.y - o.y) * (right.x - o.x);
    };
    expect(handedness('front-up')).toBe(-1);
    expect(handedness('front-left')).toBe(-1);
    expect(handedness('mini')).toBe(-1);
  });

  it('lead the arrow keys where they point', () => {
    const { bores } = placeBores(planOf(eight), 1000);
    const go = (view: 'front-up' | 'front-left', from: string, key: string) => {
      const step = stepOfKey(view, key);
      return step === undefined ? undefined : neighbour(bores, from, step)?.key;
    };
    expect(go('front-up', '5 exhaust', 'ArrowUp')).toBe('3 exhaust');
    expect(go('front-up', '5 exhaust', 'ArrowDown')).toBe('5 intake');
    expect(go('front-up', '5 exhaust', 'ArrowRight')).toBe('6 exhaust');
    expect(go('front-left', '5 exhaust', 'ArrowLeft')).toBe('3 exhaust');
    expect(go('front-left', '5 exhaust', 'ArrowUp')).toBe('6 exhaust');
    expect(go('front-up', '1 exhaust', 'ArrowUp')).toBeUndefined();
    expect(go('front-up', '1 exhaust', 'ArrowLeft')).toBeUndefined();
    expect(go('front-up', '1 exhaust', 'a')).toBeUndefined();
  });
});

describe('the map', () => {
  const bores = {
    '5 exhaust': { status: 'too-close', value: '1.8' },
    '3 exhaust': { status: 'outside', value: '-0.2' },
  } as const;
  const map = (props: object = {}) =>
    renderToStaticMarkup(
      <BoreMap
        layout={eight}
        bores={bores}
        view="front-up"
        unit="0.001 in"
        unitAloud="thousandths"
        {...props}
      />,
    );

  it('names every bore, its state and its value on a real button', () => {
    const html = map({ onSelect: () => undefined, current: '5 exhaust' });
    expect(html.match(/<button/g)).toHaveLength(16);
    expect(html).toContain('5 exhaust, too close to call, 1.8 thousandths');
    expect(html).toContain('3 exhaust, outside, −0.2 thousandths');
    expect(html).toContain('8 intake, not measured');
  });

  it('has one stop for the Tab key: the current bore', () => {
    const html = map({ onSelect: () => undefined, current: '5 exhaust' });
    expect(html.match(/tabindex="0"/g)).toHaveLength(1);
    expect(html).toMatch(/aria-current="true" data-bore="5 exhaust" tabindex="0"/);
  });

  it('leads by links without script', () => {
    const html = map({ hrefs: { '5 exhaust': '/x/5-exhaust' } });
    expect(html).toContain('href="/x/5-exhaust"');
    expect(html).not.toContain('<button');
  });

  it('is one picture with a full description where nothing can be chosen', () => {
    const html = map();
    expect(html).toMatch(/role="img" aria-label="[^"]*5 exhaust, too close to call/);
    expect(html).not.toMatch(/<button|<a /);
  });

  it('gives the whole pitch and row as target, at least 44 px each way on the tablet', () => {
    const html = map({ onSelect: () => undefined });
    const sizes = [...html.matchAll(/<foreignObject[^>]*width="([\d.]+)" height="([\d.]+)"/g)];
    expect(sizes).toHaveLength(16);
    for (const [, width, height] of sizes) {
      expect(Number(width)).toBeGreaterThanOrEqual(140);
      expect(Number(height)).toBeGreaterThanOrEqual(60);
    }
  });
});
