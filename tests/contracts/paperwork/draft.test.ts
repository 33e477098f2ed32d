import { expect, test } from 'vitest';
import * as z from 'zod/mini';
import { paperworkDraft } from '@/contracts/paperwork/draft';
import { EMPTY_DRAFT } from '@/domain/paperwork/draft';

test('a page that was open before still sends what was said about headings; it is let go', () => {
  const sent = { ...EMPTY_DRAFT, note: 'x', mapping: { OD: { kind: 'position' } } };
  expect(z.parse(paperworkDraft, sent)).toEqual({ ...EMPTY_DRAFT, note: 'x' });
});

test('anything else that is no part of a draft is refused', () => {
  expect(z.safeParse(paperworkDraft, { ...EMPTY_DRAFT, notes: 'x' }).success).toBe(false);
});
