import { describe, expect, it } from 'vitest';
import { openRemarks, type RemarkedDraft } from '@/domain/paperwork/open-remarks';

const said = (typed: string, photographs: readonly string[], note = ''): RemarkedDraft => ({
  answers: [{ subject: 'heads', position: 'engine', value: typed }],
  sheets: [],
  photographs: photographs.map((sha256) => ({
    item: 'lifters',
    fileId: sha256,
    name: `${sha256}.jpg`,
    sha256,
    bytes: '1',
    type: 'image/jpeg',
  })),
  files: [],
  note,
});

const REMARKS = ['heads', 'lifters', 'general'].map((item) => ({ item, text: `About ${item}.` }));
const openOf = (before: RemarkedDraft, now: RemarkedDraft) =>
  openRemarks(REMARKS, before, now).map(({ item }) => item);

describe('remarks that are still open', () => {
  it('are all of them while nothing changed', () => {
    const before = said('62', ['a']);
    expect(openOf(before, before)).toEqual(['heads', 'lifters', 'general']);
  });

  it('are met by a change of their item, the one on the whole by any', () => {
    expect(openOf(said('62', ['a']), said('63', ['a']))).toEqual(['lifters']);
    expect(openOf(said('62', ['a']), said('62', ['b']))).toEqual(['heads']);
    expect(openOf(said('62', ['a']), said('62', ['a'], 'As it was.'))).toEqual([
      'heads',
      'lifters',
    ]);
  });

  it('are met by an answer, not by an empty one', () => {
    const before = said('62', ['a']);
    const replies = [
      { item: 'heads', text: 'It is 62.' },
      { item: 'lifters', text: '  ' },
    ];
    expect(openOf(before, { ...before, replies })).toEqual(['lifters', 'general']);
  });

  it('do not come from the same picture under another name', () => {
    const before = said('62', ['a']);
    const renamed = {
      ...before,
      photographs: before.photographs.map((file) => ({ ...file, name: 'other.jpg' })),
    };
    expect(openOf(before, renamed)).toEqual(['heads', 'lifters', 'general']);
  });
});
