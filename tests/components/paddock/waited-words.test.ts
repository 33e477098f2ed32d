import { expect, test } from 'vitest';
import { waitedWords } from '@/components/paddock/swap/waited-words';

const HOUR = 3_600_000;
const KEPT = Date.UTC(2026, 6, 11, 20, 41);

test('a photograph of this evening needs no words; one that waited says since when, and why it counts', () => {
  expect(waitedWords(KEPT, KEPT + 19 * HOUR, 'phone')).toBe('');
  const words = waitedWords(KEPT, KEPT + 21 * HOUR, 'phone');
  expect(words).toContain(`waited on this phone since ${new Date(KEPT).toLocaleString()}`);
  expect(words).toContain('recorded with the swap');
});
