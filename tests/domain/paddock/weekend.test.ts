import { describe, expect, it } from 'vitest';
import { type WeekendFacts, weekendOf } from '@/domain/paddock/weekend';

const facts = (change: Partial<WeekendFacts>): WeekendFacts => ({
  state: 'accepted',
  remarks: 0,
  breaches: [],
  warnings: [],
  waived: [],
  rulesChanged: false,
  ...change,
});

describe('am I legal this weekend', () => {
  it.each([
    ['accepted', {}, 'nothing-against', []],
    ['draft', { state: 'draft' }, 'not-yet', ['It is not handed in.']],
    ['returned', { state: 'returned', remarks: 2 }, 'not-yet', ['It came back with 2 remarks.']],
    ['handed in', { state: 'handed-in' }, 'waits', []],
    [
      'accepted before a bulletin that it does not meet',
      { breaches: ['4.3'], rulesChanged: true },
      'against',
      ['What is declared does not meet clause 4.3.', 'The rules changed since it was handed in.'],
    ],
    [
      'accepted before a bulletin that it meets',
      { rulesChanged: true },
      'nothing-against',
      ['The rules changed since it was handed in; it meets them as they are now.'],
    ],
    [
      'a draft that would breach',
      { state: 'draft', breaches: ['4.1', '4.3'] },
      'not-yet',
      ['It is not handed in.', 'What is declared does not meet clauses 4.1, 4.3.'],
    ],
    [
      'warned and waived',
      { warnings: ['4.6'], waived: ['4.2'] },
      'nothing-against',
      ['Advice only: clause 4.6 warns.', 'Waived: clause 4.2.'],
    ],
    [
      'accepted before a breach was found',
      { breach: { notice: '2026-002', answered: false } },
      'against',
      ['A breach was found on this engine: notice 2026-002.'],
    ],
    [
      'accepted anew after a breach was found',
      { breach: { notice: '2026-002', answered: true } },
      'nothing-against',
      ['A breach was found on this engine: notice 2026-002, before this paperwork.'],
    ],
    ['withdrawn', { state: 'withdrawn' }, 'not-yet', ['It declares nothing.']],
  ] as const)('%s', (_name, change, answer, reasons) => {
    const { answer: said, reasons: why } = weekendOf(facts(change as Partial<WeekendFacts>));
    expect([said, why]).toEqual([answer, reasons]);
  });

  it('never calls an engine legal', () => {
    for (const state of ['draft', 'returned', 'handed-in', 'accepted', 'withdrawn'] as const)
      expect(JSON.stringify(weekendOf(facts({ state })))).not.toMatch(/legal|compl|safe|approv/i);
  });
});
