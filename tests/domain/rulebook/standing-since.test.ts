import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { Bulletin } from '@/domain/rulebook/bulletin';
import { findRulesInForce, type RulesQuestion } from '@/domain/rulebook/rules-in-force';
import { standingSince } from '@/domain/rulebook/standing-since';
import { clause } from './build';

const day = (n: number): string => new Date(Date.UTC(2026, 2, 1) + n * 86_400_000).toISOString();
const days = fc.integer({ min: 0, max: 60 });

const edition = (number: number, from: number) => ({
  id: `e${number}`,
  className: 'Street Stock',
  season: '2026',
  number,
  inForceAt: day(from),
  penalties: [],
  clauses: [clause(undefined, { number: '4', force: 'judged' })],
});

const bulletin = (
  number: number,
  published: number,
  effective: Bulletin['effective'],
): Bulletin => ({
  id: `b${number}`,
  number,
  season: '2026',
  edition: 1,
  title: '',
  reason: '',
  changes: [
    {
      kind: 'replace',
      clause: clause(undefined, { number: '4', force: 'judged', words: `${number}` }),
    },
  ],
  effective,
  publishedAt: day(published),
});

const effective = fc.oneof(
  fc.constant({ kind: 'safety' } as const),
  fc.constant({ kind: 'next-event' } as const),
  days.map((n) => ({ kind: 'instant', at: day(n) }) as const),
);

const published = fc.record({
  editions: fc.tuple(days, days).map(([a, b]) => [edition(1, a), edition(2, b)]),
  bulletins: fc
    .array(fc.tuple(days, effective), { maxLength: 4 })
    .map((rows) => rows.map(([at, how], i) => bulletin(i + 1, at, how))),
  clarifications: fc.array(days, { maxLength: 2 }).map((rows) =>
    rows.map((at, i) => ({
      id: `c${i}`,
      number: i + 1,
      season: '2026',
      clause: '4',
      question: '',
      answer: '',
      publishedAt: day(at),
    })),
  ),
  withdrawals: fc.array(days, { maxLength: 1 }).map((rows) =>
    rows.map((at) => ({
      id: 'w',
      number: 1,
      season: '2026',
      clarification: 1,
      clause: '4',
      reason: '',
      publishedAt: day(at),
    })),
  ),
  waivers: fc.array(fc.tuple(days, days), { maxLength: 2 }).map((rows) =>
    rows.map(([from, until], i) => ({
      id: `v${i}`,
      number: i + 1,
      season: '2026',
      clause: '4',
      for: { kind: 'car' as const, carNumber: '7' },
      words: '',
      reason: '',
      fromAt: day(from),
      untilAt: day(until),
    })),
  ),
  eventStartsAt: fc.array(days, { maxLength: 3 }).map((rows) => rows.map(day)),
});

describe('since when the rules stand', () => {
  it('is an instant at which they were already what they are', () => {
    let stood = 0;
    fc.assert(
      fc.property(published, days, (rows, at) => {
        const question: RulesQuestion = { ...rows, at: day(at) };
        const since = standingSince(question);
        const rules = findRulesInForce(question);
        expect(since === undefined).toBe(rules === undefined);
        if (since === undefined) return;
        stood += 1;
        expect(since).toBeLessThanOrEqual(Date.parse(question.at));
        // At any millisecond between the two as well: nothing changes there.
        for (const between of [since, (since + Date.parse(question.at)) / 2]) {
          const then = { ...rows, at: new Date(Math.floor(between)).toISOString() };
          expect(findRulesInForce(then)).toEqual(rules);
        }
      }),
      { numRuns: 400 },
    );
    expect(stood).toBeGreaterThan(100);
  });

  it('is the last change by then, to the millisecond', () => {
    const question = {
      editions: [edition(1, 0)],
      bulletins: [bulletin(1, 2, { kind: 'instant', at: day(10) })],
      clarifications: [],
      waivers: [],
      eventStartsAt: [],
    };
    const boundary = Date.parse(day(10));
    const at = (ms: number) => standingSince({ ...question, at: new Date(ms).toISOString() });
    expect(at(boundary - 1)).toBe(Date.parse(day(0)));
    expect(at(boundary)).toBe(boundary);
    expect(at(Date.parse(day(0)) - 1)).toBeUndefined();
  });
});
