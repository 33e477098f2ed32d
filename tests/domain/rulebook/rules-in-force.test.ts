import canonicalize from 'canonicalize';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { Bulletin } from '@/domain/rulebook/bulletin';
import { differences } from '@/domain/rulebook/differences';
import type { Edition } from '@/domain/rulebook/edition';
import { inches } from '@/domain/rulebook/rule-sets/rule-set';
import {
  findRulesInForce,
  type RulesQuestion,
  rulesDocument,
} from '@/domain/rulebook/rules-in-force';
import type { Clarification, Waiver, Withdrawal } from '@/domain/rulebook/ruling';
import { clause, clearance } from './build';

const edition: Edition = {
  id: 'e1',
  className: 'Street Stock',
  season: '2026',
  number: 1,
  inForceAt: '2026-03-01T06:00:00.000Z',
  penalties: [],
  clauses: [
    clause(clearance({ max: inches('0.0019') }), { number: '4.6' }),
    clause(undefined, { number: '4.10', force: 'judged' }),
    clause(undefined, { number: '4', force: 'text', words: 'Tappets' }),
  ],
};

const bulletin = (number: number, more: Partial<Bulletin> = {}): Bulletin => ({
  id: `b${number}`,
  number,
  season: '2026',
  edition: 1,
  title: `Bulletin ${number}`,
  reason: 'Questions from competitors',
  changes: [],
  effective: { kind: 'instant', at: '2026-06-01T05:00:00.000Z' },
  publishedAt: '2026-05-20T17:00:00.000Z',
  ...more,
});

const replace = (max: string) =>
  ({
    kind: 'replace',
    clause: clause(clearance({ max: inches(max) }), { number: '4.6' }),
  }) as const;

const ask = (at: string, more: Partial<RulesQuestion> = {}) =>
  findRulesInForce({
    editions: [edition],
    bulletins: [],
    clarifications: [],
    waivers: [],
    eventStartsAt: [],
    at,
    ...more,
  });

const maxOf = (rules: ReturnType<typeof ask>): string | undefined => {
  const rule = rules?.clauses.find((row) => row.number === '4.6')?.requirement;
  return rule?.kind === 'limit' ? rule.max?.text : undefined;
};

const numbers = (rules: ReturnType<typeof ask>) => rules?.clauses.map((row) => row.number);

describe('an edition', () => {
  it('is in force from its millisecond on', () => {
    expect(ask('2026-03-01T05:59:59.999Z')).toBeUndefined();
    expect(ask('2026-03-01T06:00:00.000Z')?.edition).toBe(1);
  });

  it('is superseded by the next one, with which its bulletins end', () => {
    const next: Edition = {
      ...edition,
      id: 'e2',
      number: 2,
      inForceAt: '2026-07-01T05:00:00.000Z',
    };
    const more = {
      editions: [next, edition],
      bulletins: [bulletin(1, { changes: [replace('0.0020')] })],
    };
    expect(ask('2026-07-01T04:59:59.999Z', more)).toMatchObject({ edition: 1, bulletins: [1] });
    expect(ask('2026-07-01T05:00:00.000Z', more)).toMatchObject({ edition: 2, bulletins: [] });
  });

  it('reads in the tree’s order', () => {
    expect(numbers(ask('2026-04-01T00:00:00.000Z'))).toEqual(['4', '4.6', '4.10']);
  });
});

describe('a bulletin', () => {
  const eventStartsAt = [
    '2026-06-27T22:00:00.000Z',
    '2026-05-22T22:00:00.000Z',
    '2026-05-15T22:00:00.000Z',
  ];
  it.each([
    [
      'an instant, not before',
      { kind: 'instant', at: '2026-06-01T05:00:00.000Z' },
      '2026-06-01T04:59:59.999Z',
      '2026-06-01T05:00:00.000Z',
    ],
    [
      'an instant before publication counts from publication',
      { kind: 'instant', at: '2026-01-01T00:00:00.000Z' },
      '2026-05-20T16:59:59.999Z',
      '2026-05-20T17:00:00.000Z',
    ],
    ['safety, at once', { kind: 'safety' }, '2026-05-20T16:59:59.999Z', '2026-05-20T17:00:00.000Z'],
    [
      'the next event, at its start',
      { kind: 'next-event' },
      '2026-05-22T21:59:59.999Z',
      '2026-05-22T22:00:00.000Z',
    ],
  ] as const)('%s', (_, effective, before, from) => {
    const more = {
      bulletins: [bulletin(1, { effective, changes: [replace('0.0020')] })],
      eventStartsAt,
    };
    expect(maxOf(ask(before, more))).toBe('0.0019');
    expect(maxOf(ask(from, more))).toBe('0.0020');
  });

  it('from the next event waits while none is known, and an event under way keeps its rules', () => {
    const more = {
      bulletins: [bulletin(1, { effective: { kind: 'next-event' }, changes: [replace('0.0020')] })],
    };
    expect(maxOf(ask('2026-12-31T00:00:00.000Z', more))).toBe('0.0019');
    const underWay = { ...more, eventStartsAt: ['2026-05-20T16:59:59.999Z'] };
    expect(maxOf(ask('2026-05-20T23:00:00.000Z', underWay))).toBe('0.0019');
    const atStart = { ...more, eventStartsAt: ['2026-05-20T17:00:00.000Z'] };
    expect(maxOf(ask('2026-05-20T17:00:00.000Z', atStart))).toBe('0.0020');
  });

  it('takes effect at local midnight across a change of summer time', () => {
    // 2026-11-02 00:00 in America/Chicago is UTC−6, the night before was still UTC−5.
    const more = {
      bulletins: [
        bulletin(1, {
          effective: { kind: 'instant', at: '2026-11-02T06:00:00.000Z' },
          changes: [replace('0.0020')],
        }),
      ],
    };
    expect(maxOf(ask('2026-11-02T05:59:59.999Z', more))).toBe('0.0019');
    expect(maxOf(ask('2026-11-02T06:00:00.000Z', more))).toBe('0.0020');
  });

  it('adds, replaces and withdraws, the higher number last', () => {
    const more = {
      bulletins: [
        bulletin(3, { changes: [{ kind: 'withdraw', number: '4.10' }, replace('0.0021')] }),
        bulletin(2, {
          changes: [
            replace('0.0020'),
            { kind: 'add', clause: clause(undefined, { number: '4.7', force: 'judged' }) },
          ],
        }),
      ],
    };
    const rules = ask('2026-06-01T05:00:00.000Z', more);
    expect(maxOf(rules)).toBe('0.0021');
    expect(numbers(rules)).toEqual(['4', '4.6', '4.7']);
    expect(rules?.sources).toEqual([
      { clause: '4', edition: 1 },
      { clause: '4.6', edition: 1, bulletin: 3 },
      { clause: '4.7', edition: 1, bulletin: 2 },
    ]);
  });
});

describe('clarifications and waivers', () => {
  const clarification: Clarification = {
    id: 'c1',
    number: 1,
    season: '2026',
    clause: '4.6',
    question: 'Which mean?',
    answer: 'Of all readings.',
    publishedAt: '2026-04-01T00:00:00.000Z',
  };
  const withdrawal: Withdrawal = {
    id: 'x1',
    number: 1,
    season: '2026',
    clarification: 1,
    clause: '4.6',
    reason: 'It was read in two ways.',
    publishedAt: '2026-05-01T00:00:00.000Z',
  };
  const waiver: Waiver = {
    id: 'w1',
    number: 1,
    season: '2026',
    clause: '4.10',
    for: { kind: 'car', carNumber: '12J' },
    words: 'May run.',
    reason: 'Parts late',
    fromAt: '2026-04-01T00:00:00.000Z',
    untilAt: '2026-05-01T00:00:00.000Z',
  };
  const more = { clarifications: [clarification], waivers: [waiver], withdrawals: [withdrawal] };

  it.each([
    ['2026-03-31T23:59:59.999Z', 0],
    ['2026-04-01T00:00:00.000Z', 1],
    ['2026-04-30T23:59:59.999Z', 1],
    ['2026-05-01T00:00:00.000Z', 0],
  ])('at %s: %i each', (at, count) => {
    const rules = ask(at, more);
    expect([rules?.clarifications.length, rules?.waivers.length]).toEqual([count, count]);
  });

  it('end with their clause and with their season', () => {
    const at = '2026-04-15T00:00:00.000Z';
    const withdrawn = bulletin(1, {
      effective: { kind: 'safety' },
      publishedAt: '2026-04-10T00:00:00.000Z',
      changes: [{ kind: 'withdraw', number: '4.10' }],
    });
    expect(ask(at, { ...more, bulletins: [withdrawn] })?.waivers).toEqual([]);
    expect(ask(at, { ...more, waivers: [{ ...waiver, season: '2025' }] })?.waivers).toEqual([]);
  });

  it('end in withdrawals that stand in the document, by number', () => {
    const at = '2026-05-01T00:00:00.000Z';
    expect(ask('2026-04-30T23:59:59.999Z', more)).not.toHaveProperty('withdrawals');
    expect(ask(at, more)?.withdrawals).toEqual([1]);
    const other = { ...withdrawal, id: 'x2', number: 2, clarification: 2 };
    const strange = { ...withdrawal, id: 'x3', number: 3, season: '2025' };
    const rules = ask(at, { ...more, withdrawals: [strange, other, withdrawal] });
    expect(rules?.withdrawals).toEqual([1, 2]);
    expect(ask(at, { ...more, withdrawals: [other] })?.clarifications).toEqual([clarification]);
    const text = (row: Partial<RulesQuestion>) => {
      const found = ask(at, row);
      return found && canonicalize(rulesDocument(found));
    };
    expect(text({ withdrawals: [withdrawal] })).not.toBe(text({}));
  });

  it('are part of the document', () => {
    const at = '2026-04-15T00:00:00.000Z';
    const texts = [{}, { waivers: [waiver] }, { clarifications: [clarification] }].map((row) => {
      const rules = ask(at, row);
      return rules === undefined ? '' : canonicalize(rulesDocument(rules));
    });
    expect(new Set(texts).size).toBe(3);
  });
});

describe('the document', () => {
  const all = [
    bulletin(1, { changes: [replace('0.0020')] }),
    bulletin(2, {
      changes: [{ kind: 'add', clause: clause(undefined, { number: '4.7', force: 'judged' }) }],
    }),
    bulletin(3, { changes: [{ kind: 'withdraw', number: '4.7' }, replace('0.0018')] }),
    bulletin(4, {
      changes: [
        {
          kind: 'add',
          clause: clause(undefined, { number: '4.7', force: 'judged', words: 'Anew.' }),
        },
      ],
    }),
    bulletin(10, { changes: [replace('0.0022')] }),
  ];
  const textOf = (bulletins: readonly Bulletin[], at = '2026-06-01T05:00:00.000Z') => {
    const rules = ask(at, { bulletins });
    if (rules === undefined) throw new Error('no rules');
    return canonicalize(rulesDocument(rules));
  };

  it('does not depend on the order in which bulletins were typed', () => {
    const expected = textOf(all);
    expect(expected).toContain('0.0022');
    fc.assert(
      fc.property(fc.shuffledSubarray(all, { minLength: all.length }), (bulletins) => {
        expect(textOf(bulletins)).toBe(expected);
      }),
    );
  });

  it('depends on each bulletin, and not on the day of asking', () => {
    for (const left of all) expect(textOf(all.filter((row) => row !== left))).not.toBe(textOf(all));
    expect(textOf(all, '2026-09-01T00:00:00.000Z')).toBe(textOf(all));
  });

  it('holds no number but as text', () => {
    const text = textOf(all) ?? '';
    const kinds = new Set<string>();
    JSON.parse(text, (_, value: unknown) => {
      kinds.add(typeof value);
      return value;
    });
    expect([...kinds].sort()).toEqual(['object', 'string']);
  });
});

describe('differences', () => {
  it('show words and limits clause by clause, and leave out what stayed', () => {
    const before = edition.clauses;
    const after = [
      clause(clearance({ max: inches('0.0020') }), { number: '4.6' }),
      clause(undefined, { number: '4', force: 'text', words: 'Lifters' }),
      clause(undefined, { number: '4.2', force: 'judged' }),
    ];
    const found = differences(before, after);
    expect(found.map((row) => [row.number, row.kind])).toEqual([
      ['4', 'changed'],
      ['4.2', 'added'],
      ['4.6', 'changed'],
      ['4.10', 'withdrawn'],
    ]);
    expect(found[0]).toMatchObject({
      parts: [{ part: 'words', before: 'Tappets', after: 'Lifters' }],
    });
    const [limit] = found[2]?.kind === 'changed' ? found[2].parts : [];
    expect(limit?.before).toContain('at least 0.0013 in and at most 0.0019 in');
    expect(limit?.after).toContain('at least 0.0013 in and at most 0.0020 in');
    expect(differences(before, [...before].reverse())).toEqual([]);
  });

  it('do not overlook a change that has no words', () => {
    const rule = { kind: 'sheet', subject: 'a', sheet: 'other', title: 'T' } as const;
    const found = differences([clause(rule)], [clause({ ...rule, subject: 'b' })]);
    expect(found).toMatchObject([{ kind: 'changed', parts: [{ part: 'requirement' }] }]);
  });
});
