import { describe, expect, it } from 'vitest';
import { findBulletinFaults } from '@/domain/rulebook/ambiguity/bulletin-faults';
import type { ClauseChange, Effective } from '@/domain/rulebook/bulletin';
import { inches } from '@/domain/rulebook/rule-sets/rule-set';
import { clause, clearance } from './build';

const rules = {
  penalties: [],
  clauses: [
    clause(undefined, { number: '4', force: 'text' }),
    clause(clearance(), { number: '4.6' }),
    clause(undefined, { number: '4.7', force: 'judged', refs: ['4.6'] }),
  ],
};
const PUBLISHED = '2026-05-20T17:00:00.000Z';
const faults = (changes: readonly ClauseChange[], effective: Effective = { kind: 'next-event' }) =>
  findBulletinFaults({ title: 'T', reason: 'R', changes, effective }, rules, PUBLISHED);

const sound: ClauseChange = {
  kind: 'replace',
  clause: clause(clearance({ max: inches('0.0020') }), { number: '4.6' }),
};

describe('a bulletin', () => {
  it('that is sound can be published', () => {
    expect(faults([sound])).toEqual([]);
    expect(faults([sound], { kind: 'instant', at: PUBLISHED })).toEqual([]);
    expect(
      faults([{ kind: 'add', clause: clause(undefined, { number: '4.8', force: 'judged' }) }]),
    ).toEqual([]);
  });

  it.each<[string, readonly ClauseChange[], string, RegExp]>([
    ['adds what exists', [{ ...sound, kind: 'add' }], '/changes/0', /exists already/],
    [
      'replaces what does not',
      [{ kind: 'replace', clause: clause(undefined, { number: '9', force: 'judged' }) }],
      '/changes/0',
      /no clause 9/,
    ],
    [
      'withdraws what does not exist',
      [{ kind: 'withdraw', number: '9' }],
      '/changes/0',
      /no clause 9/,
    ],
    [
      'leaves clauses without their parent',
      [{ kind: 'withdraw', number: '4' }],
      '/changes/0',
      /4\.6 stands below 4/,
    ],
    [
      'leaves a reference into nothing',
      [{ kind: 'withdraw', number: '4.6' }],
      '/changes',
      /Clause 4\.7: There is no clause 4\.6/,
    ],
    [
      'is ambiguous in itself',
      [
        sound,
        { kind: 'replace', clause: clause(clearance({ figure: undefined }), { number: '4.6' }) },
      ],
      '/changes/1/clause/requirement/figure',
      /mean, the smallest/,
    ],
    ['changes nothing', [], '/changes', /changes nothing/],
  ])('that %s cannot', (_, changes, pointer, words) => {
    const fault = faults(changes).find((row) => row.pointer === pointer);
    expect(fault?.detail).toMatch(words);
  });

  it('never counts before it is published, and says why it is', () => {
    const early = faults([sound], { kind: 'instant', at: '2026-05-20T16:59:59.999Z' });
    expect(early.map((row) => row.pointer)).toEqual(['/effective/at']);
    const silent = findBulletinFaults(
      { title: ' ', reason: '', changes: [sound], effective: { kind: 'safety' } },
      rules,
      PUBLISHED,
    );
    expect(silent.map((row) => row.pointer)).toEqual(['/title', '/reason']);
  });
});
