import { expect, test } from 'vitest';
import { dueFirst, isOverdue, swapOf } from '@/domain/paddock/swap-due';

const swaps = [
  { paperworkId: 'c', dueAt: '2026-07-14T20:00:00.000Z' },
  { paperworkId: 'b', dueAt: '2026-07-12T20:00:00.000Z' },
  { paperworkId: 'c', dueAt: '2026-07-13T20:00:00.000Z' },
];

test('what is due after a swap stands first, in the order of its days; the rest as it stood', () => {
  const rows = ['a', 'c', 'd', 'b', 'e'].map((id) => ({ id }));
  expect(dueFirst(rows, swaps).map(({ id }) => id)).toEqual(['b', 'c', 'a', 'd', 'e']);
  expect(dueFirst(rows, [])).toEqual(rows);
});

test('of two swaps into one paperwork the earlier day counts', () => {
  expect(swapOf(swaps, 'c')?.dueAt).toBe('2026-07-13T20:00:00.000Z');
  expect(swapOf(swaps, 'a')).toBe(undefined);
});

test.each([
  ['2026-07-13T19:59:59.999Z', false],
  ['2026-07-13T20:00:00.000Z', true],
  ['2026-07-13T20:00:00.001Z', true],
])('by its instant: at %s overdue is %s', (now, overdue) => {
  expect(isOverdue({ dueAt: '2026-07-13T20:00:00.000Z' }, now)).toBe(overdue);
});
