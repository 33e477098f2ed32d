import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';

/** Relative luminance and contrast ratio: WCAG 2.2, definitions of the same names. */
const luminance = (hex: string): number => {
  const full = hex.length === 4 ? hex.replace(/[0-9a-f]/gi, '$&$&') : hex;
  const [r = 0, g = 0, b = 0] = [1, 3, 5].map((at) => {
    const c = Number.parseInt(full.slice(at, at + 2), 16) / 255;
    return c <= 0.04045 ? c / 12.92 : ((c + 0.055) / 1.055) ** 2.4;
  });
  return 0.2126 * r + 0.7152 * g + 0.0722 * b;
};
const contrast = (a: string, b: string): number => {
  const [low, high] = [luminance(a), luminance(b)].sort((x, y) => x - y) as [number, number];
  return (high + 0.05) / (low + 0.05);
};

const css = readFileSync('src/styles/tokens.css', 'utf8');
const block = (opening: string): Record<string, string> => {
  const from = css.indexOf(opening);
  const text = css.slice(from, css.indexOf('}', from));
  return Object.fromEntries(
    [...text.matchAll(/--color-([a-z0-9-]+): (#[0-9a-f]{3,6})/g)].map((m) => [m[1], m[2]]),
  );
};
const day = block('@theme');
const night = block(':root[data-theme="night"]');
const nightBySystem = block(':root:not([data-theme="light"])');
const print = block(':root,\n  :root[data-theme]');

// Text, ground, least ratio. The status colours on the plate are 6.8: they carry marks and large words.
const pairs: readonly [string, string, number][] = [
  ['ink', 'plate', 7],
  ['ink', 'card', 7],
  ['ink', 'tint-outside', 7],
  ['ink', 'tint-close', 7],
  ['ink-2', 'plate', 7],
  ['ink-2', 'card', 7],
  ['marking', 'plate', 7],
  ['marking', 'card', 7],
  ['on-marking', 'marking', 7],
  ['on-close', 'close', 7],
  ['outside', 'card', 7],
  ['within', 'card', 7],
  ['outside', 'plate', 6.7],
  ['within', 'plate', 6.7],
  ['on-outside', 'outside', 7],
  ['edge', 'plate', 3],
  ['edge', 'card', 3],
];

describe('the palette', () => {
  it('knows two published ratios', () => {
    expect(contrast('#000000', '#ffffff')).toBeCloseTo(21, 6);
    // A well-known pair of the WCAG's own discussion: #767676 on white just passes 4.5.
    expect(contrast('#767676', '#ffffff')).toBeCloseTo(4.54, 2);
  });

  for (const [theme, colours] of [
    ['day', day],
    ['night', night],
    ['print', print],
  ] as const)
    it.each(pairs)(`${theme}: %s on %s is at least %d`, (text, ground, least) => {
      const [a, b] = [colours[text], colours[ground]];
      expect(a).toBeDefined();
      expect(b).toBeDefined();
      expect(contrast(a as string, b as string)).toBeGreaterThanOrEqual(least);
    });

  it('has one night, whichever way it is asked for', () => {
    expect(Object.keys(night).length).toBeGreaterThan(12);
    expect(nightBySystem).toEqual(night);
  });

  it('gives night and print a value for every colour of the day', () => {
    expect(Object.keys(night).sort()).toEqual(Object.keys(day).sort());
    expect(Object.keys(print).sort()).toEqual(Object.keys(day).sort());
  });

  it('prints black and white only', () => {
    expect([...new Set(Object.values(print))].sort()).toEqual(['#000', '#fff']);
  });
});
