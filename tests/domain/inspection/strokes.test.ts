import { describe, expect, it } from 'vitest';
import {
  areStrokes,
  MOST_POINTS,
  MOST_STROKES,
  PAD,
  readStrokes,
  strokePath,
  strokesDocument,
  withPoint,
} from '@/domain/inspection/strokes';

describe('pen strokes', () => {
  it('grow by whole units on the pad, and not where the pen stands still', () => {
    const begun = withPoint('', 12.4, 30.5);
    expect(begun).toBe('12,31');
    expect(withPoint(begun, 12.3, 31.2)).toBe('12,31');
    expect(withPoint(begun, 112, 131)).toBe('12,31 112,131');
    expect(withPoint('112,31', 12, 31)).toBe('112,31 12,31');
    expect(withPoint(begun, -7, 9999)).toBe(`12,31 0,${PAD.height}`);
    expect(areStrokes([withPoint(begun, -7, 9999)])).toBe(true);
  });

  it('are nothing else than points on the pad, and not without end', () => {
    expect(areStrokes(['0,0', `${PAD.width},${PAD.height} 5,5`])).toBe(true);
    for (const wrong of [
      '',
      '1,2 ',
      '1.5,2',
      '-1,2',
      '01,2',
      '1,2  3,4',
      '1,2;3,4',
      `${PAD.width + 1},0`,
      `0,${PAD.height + 1}`,
      '1,2" onload="x',
    ])
      expect([wrong, areStrokes([wrong])]).toEqual([wrong, false]);
    expect(areStrokes([])).toBe(false);
    const many = (count: number) => Array.from({ length: count }, (_, i) => `${i % 1000},1`);
    expect(areStrokes(many(MOST_STROKES))).toBe(true);
    expect(areStrokes(many(MOST_STROKES + 1))).toBe(false);
    expect(areStrokes([many(MOST_POINTS).join(' ')])).toBe(true);
    expect(areStrokes([many(MOST_POINTS + 1).join(' ')])).toBe(false);
  });

  it('stand in a document with the report they belong to, and are read back from it', () => {
    const strokes = ['1,2 3,4', '9,9'];
    const text = strokesDocument('ab'.repeat(32), strokes);
    expect(text).toBe(
      `{"document":"tagwire/strokes","height":"300","report":"${'ab'.repeat(32)}","strokes":["1,2 3,4","9,9"],"version":"1","width":"1000"}`,
    );
    expect(readStrokes(text)).toEqual(strokes);
    for (const other of ['', 'null', '{}', '{"strokes":"1,2"}', '{"strokes":["a"]}'])
      expect(readStrokes(other)).toBeUndefined();
  });

  it('are drawn through their points, a dot too', () => {
    expect(strokePath('1,2 3,4 5,6')).toBe('M1,2L3,4L5,6');
    expect(strokePath('7,8')).toBe('M7,8h0');
  });
});
