import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { DrawCommitment, DrawMade, DrawVoid } from '@/domain/draw/documents';
import { readDrawCommitment } from '@/domain/draw/documents';
import { type DrawState, nextDrawState } from '@/domain/draw/history';
import { makeDraw, runDraw } from '@/domain/draw/make-draw';
import { commitmentHash, secretHash } from '@/domain/draw/seed';
import type { PublishedValue } from '@/domain/draw/values';
import { verifyDraw } from '@/domain/draw/verify-draw';
import { verifyDrawLines } from '@/domain/draw/verify-draw-lines';
import { verifyVoid } from '@/domain/draw/verify-void';
import { sha256, toHex } from '@/domain/ledger/bytes';
import { canonicalBytes, canonicalJson } from '@/domain/ledger/canonical';
import { originOf } from '@/domain/ledger/checkpoint';
import { lineText, type NewLine } from '@/domain/ledger/line';
import { conclude, type Step } from '@/domain/ledger/verify/step';
import {
  commitments,
  example,
  proofIn,
  proofOf,
  SERIES,
  saltOf,
  signer,
  testSigner,
  text,
  uuid,
} from '../ledger/example';
import { flipped } from '../ledger/grown-tree';

const { drawCommitment: commitment, drawSecret: secret, made } = example;

const failedIds = (steps: readonly Step[]) =>
  steps.filter((step) => step.outcome === 'failed').map((step) => step.id);

const verify = (change: { commitment?: Partial<DrawCommitment>; made?: Partial<DrawMade> }) =>
  verifyDraw({
    commitment: canonicalJson({ ...commitment, ...change.commitment }),
    made: canonicalJson({ ...made, ...change.made }),
  });

describe('verifyDraw', () => {
  it('passes every step for a draw as published and shows each round', () => {
    const { steps, run } = verify({});
    expect(steps.map((step) => [step.id, step.outcome])).toEqual([
      ['draw-announced', 'passed'],
      ['same-draw', 'passed'],
      ['secret-kept', 'passed'],
      ['values-announced', 'passed'],
      ['enough-randomness', 'passed'],
      ['same-cars', 'passed'],
    ]);
    expect(run?.rounds.map(({ left }) => left)).toEqual([10, 9]);
    expect(run?.values).toBe('21390.21417.21802.22005./14./');
  });

  it('names what was changed afterwards', () => {
    const [first, second] = made.selected;
    const other = commitment.pool.find(({ car }) => car !== first!.car && car !== second!.car)!;
    expect(failedIds(verify({ made: { selected: [first!, other] } }).steps)).toEqual(['same-cars']);
    expect(failedIds(verify({ made: { selected: [second!, first!] } }).steps)).toEqual([
      'same-cars',
    ]);
    expect(failedIds(verify({ made: { selected: [first!] } }).steps)).toEqual(['same-cars']);
    expect(failedIds(verify({ made: { secret: '00'.repeat(32) } }).steps)).toContain('secret-kept');
    expect(
      failedIds(verify({ commitment: { pool: commitment.pool.slice(0, 9) } }).steps),
    ).toContain('same-draw');
    expect(failedIds(verify({ commitment: { select: '3' } }).steps)).toContain('same-draw');
    expect(failedIds(verify({ made: { draw: commitment.event } }).steps)).toEqual(['same-draw']);
  });

  it('names values that were not announced, left out, or written wrongly', () => {
    const [laps, dice] = made.values;
    const bad: readonly DrawMade['values'][] = [
      [laps!],
      [dice!, laps!],
      [laps!, { ...dice!, source: 'missing', numbers: [] }],
      [{ ...laps!, source: 'substitute' }, dice!],
      [{ ...laps!, source: 'missing' }, dice!],
      [{ ...laps!, numbers: [] }, dice!],
      [{ ...laps!, numbers: ['021417'] }, dice!],
      [{ ...laps!, numbers: ['21.417'] }, dice!],
    ];
    for (const values of bad) {
      expect(failedIds(verify({ made: { values } }).steps)).toContain('values-announced');
    }
    const leftOut = [{ ...laps!, source: 'missing' as const, numbers: [] }, dice!];
    expect(failedIds(verify({ made: { values: leftOut } }).steps)).not.toContain(
      'values-announced',
    );
    expect(verify({ made: { values: leftOut } }).run?.values).toBe('/14./');
  });

  it('does not depend on the order in which numbers of one value are published', () => {
    const [laps, dice] = made.values;
    const values = [{ ...laps!, numbers: laps!.numbers.toReversed() }, dice!];
    expect(conclude(verify({ made: { values } }).steps)).toBe('passed');
  });

  it('refuses an announcement that is no fair basis', () => {
    const pool = commitment.pool;
    const bad: readonly Partial<DrawCommitment>[] = [
      { pool: pool.slice(1) },
      { pool: [...pool.slice(0, 9), { number: '10', car: '7' }] },
      { select: '0' },
      { select: '11' },
      { values: [commitment.values[0]!, commitment.values[0]!] },
      { values: [{ ...commitment.values[0]!, substitute: 'another' }] },
      { values: [{ ...commitment.values[1]!, substitute: '' }] },
      {
        pool: Array.from({ length: 1000 }, (_, i) => ({ number: String(i + 1), car: `c${i}` })),
        select: '500',
      },
    ];
    for (const change of bad) {
      expect(readDrawCommitment(canonicalJson({ ...commitment, ...change })).ok).toBe(false);
      expect(verify({ commitment: change }).steps.map(({ id }) => id)).toEqual(['draw-announced']);
    }
    expect(verifyDraw({ commitment: text.drawCommitment, made: '{}' }).steps.at(-1)?.outcome).toBe(
      'failed',
    );
  });

  it('never passes with any one character of either document changed', () => {
    fc.assert(
      fc.property(
        fc.constantFrom('commitment' as const, 'made' as const),
        fc.nat(),
        fc.constantFrom('0', '1', 'a', 'x'),
        (which, place, char) => {
          const published = { commitment: text.drawCommitment, made: text.drawMade };
          const at = place % published[which].length;
          fc.pre(published[which][at] !== char);
          const changed = published[which].slice(0, at) + char + published[which].slice(at + 1);
          expect(conclude(verifyDraw({ ...published, [which]: changed }).steps)).toBe('failed');
        },
      ),
      { numRuns: 500 },
    );
  });
});

describe('the seed', () => {
  it('changes with every bit of secret and commitment, and with every value', () => {
    const seed = toHex(runDraw(commitment, secret, made.values).seed);
    for (let bit = 0; bit < 256; bit++) {
      expect(toHex(runDraw(commitment, flipped(secret, bit), made.values).seed)).not.toBe(seed);
    }
    const other = { ...commitment, subject: 'Another class' };
    expect(toHex(runDraw(other, secret, made.values).seed)).not.toBe(seed);
    const [laps, dice] = made.values;
    const later = [{ ...laps!, numbers: [...laps!.numbers, '22006'] }, dice!];
    expect(toHex(runDraw(commitment, secret, later).seed)).not.toBe(seed);
  });

  it('keeps apart numbers that could be joined another way', () => {
    const one = (numbers: readonly string[]): PublishedValue => ({
      name: 'n',
      source: 'announced',
      numbers,
    });
    const seeds = [
      [one(['1', '23'])],
      [one(['12', '3'])],
      [one(['123'])],
      [one(['1']), one(['23'])],
      [one([]), one(['1', '23'])],
    ].map((values) => toHex(runDraw(commitment, secret, values).seed));
    expect(new Set(seeds).size).toBe(seeds.length);
  });
});

describe('makeDraw', () => {
  it('is refused with another secret, and where a value that voids the draw is missing', () => {
    expect(makeDraw(commitment, flipped(secret, 0), made.values).ok).toBe(false);
    const strict: DrawCommitment = {
      ...commitment,
      values: [{ name: 'Laps', ifMissing: 'void', substitute: '' }],
    };
    const missing = [{ name: 'Laps', source: 'missing' as const, numbers: [] }];
    expect(makeDraw(strict, secret, missing)).toMatchObject({
      ok: false,
      failure: { name: 'not-in-this-state' },
    });
    expect(() => secretHash(new Uint8Array(31))).toThrow(RangeError);
  });
});

const ended: DrawVoid = {
  v: '1',
  type: 'tagwire/draw-void',
  draw: commitment.draw,
  commitment: toHex(commitmentHash(commitment)),
  reason: 'The feature was rained out before a lap was timed.',
  secret: toHex(secret),
};

describe('a void draw', () => {
  it('shows its secret all the same', () => {
    const check = (change: Partial<DrawVoid>) =>
      verifyVoid({
        commitment: text.drawCommitment,
        ended: canonicalJson({ ...ended, ...change }),
      });
    expect(conclude(check({}))).toBe('passed');
    expect(failedIds(check({ secret: '00'.repeat(32) }))).toEqual(['secret-kept']);
    expect(failedIds(check({ commitment: '00'.repeat(32) }))).toEqual(['same-draw']);
    expect(failedIds(check({ draw: commitment.event }))).toEqual(['same-draw']);
    expect(conclude(check({ secret: '' }))).toBe('not checked');
    expect(conclude(verifyVoid({ commitment: text.drawCommitment, ended: '{}' }))).toBe('failed');
  });
});

describe('the history of a subject’s draw', () => {
  const none: DrawState = { at: 'none' };
  const committed: DrawState = { at: 'committed', commitment };
  const done: DrawState = { at: 'made', commitment, made };
  const voided: DrawState = { at: 'void', commitment, ended };
  const again: DrawCommitment = {
    ...commitment,
    draw: commitment.event,
    follows: toHex(sha256(canonicalBytes(ended))),
  };

  it('goes from announced to drawn or void, and from void to a draw that names it', () => {
    expect(nextDrawState(none, commitment)).toEqual({ ok: true, value: committed });
    expect(nextDrawState(committed, made)).toEqual({ ok: true, value: done });
    expect(nextDrawState(committed, ended)).toEqual({ ok: true, value: voided });
    expect(nextDrawState(voided, again)).toEqual({
      ok: true,
      value: { at: 'committed', commitment: again },
    });
  });

  it('knows no second draw', () => {
    const refusals: readonly [DrawState, Parameters<typeof nextDrawState>[1]][] = [
      [none, made],
      [none, again],
      [committed, commitment],
      [committed, again],
      [committed, { ...made, draw: commitment.event }],
      [committed, { ...ended, commitment: '00'.repeat(32) }],
      [done, made],
      [done, ended],
      [done, commitment],
      [done, again],
      [voided, made],
      [voided, commitment],
      [voided, { ...again, follows: '00'.repeat(32) }],
      [voided, { ...again, subject: 'Another class' }],
      [voided, { ...again, draw: commitment.draw }],
    ];
    for (const [state, act] of refusals) {
      expect(nextDrawState(state, act)).toMatchObject({
        ok: false,
        failure: { name: 'not-in-this-state' },
      });
    }
  });
});

describe('verifyDrawLines', () => {
  const announced = async () => ({
    document: text.drawCommitment,
    salt: saltOf('draw'),
    proof: await proofOf(1, 3),
  });
  const result = async () => ({
    document: text.drawMade,
    salt: saltOf('result'),
    proof: await proofOf(2, 3),
  });

  it('shows that the announcement was logged first and before the session', async () => {
    const steps = verifyDrawLines(await announced(), await result(), [signer.key]);
    expect(conclude(steps)).toBe('passed');
    expect(steps.length).toBe(10);
  });

  it('names other documents, swapped lines and a late announcement', async () => {
    const [first, second] = [await announced(), await result()];
    expect(failedIds(verifyDrawLines(second, first, [signer.key]))).toContain('draw-logged');
    const forged = { ...second, document: second.document.replace('"14"', '"15"') };
    expect(failedIds(verifyDrawLines(first, forged, [signer.key]))).toEqual(['draw-logged']);
    const salted = { ...second, salt: saltOf('draw') };
    expect(failedIds(verifyDrawLines(first, salted, [signer.key]))).toEqual(['draw-logged']);
    const late = { ...first, document: first.document.replace('T18:00', 'T08:00') };
    expect(failedIds(verifyDrawLines(late, second, [signer.key]))).toEqual([
      'draw-logged',
      'logged-before-session',
    ]);
    expect(conclude(verifyDrawLines(first, second, []))).toBe('failed');
  });

  it('demands lines of the right kinds, in order, in the series’ own ledger', async () => {
    const other = testSigner(originOf('records.example/ledger', uuid('other series')), 'foreign');
    const run = async (
      order: readonly ['draw-committed' | 'report-signed', 'draw-made' | 'report-signed'],
      by = signer,
      series = SERIES,
      turned = false,
    ) => {
      const line = (index: number, kind: NewLine['kind'], label: string, document: string) =>
        lineText({
          series,
          index,
          act: series,
          at: `2027-05-01T0${index}:00:00.000Z`,
          kind,
          commitments: commitments(label, { draw: document }),
        });
      const [a, b] = turned ? [1, 0] : [0, 1];
      const announcedLine = line(a, order[0], 'draw', text.drawCommitment);
      const madeLine = line(b, order[1], 'result', text.drawMade);
      const ledger = turned ? [madeLine, announcedLine] : [announcedLine, madeLine];
      const steps = verifyDrawLines(
        { ...(await announced()), proof: await proofIn(ledger, a, by) },
        { ...(await result()), proof: await proofIn(ledger, b, by) },
        [by.key],
      );
      return failedIds(steps);
    };
    expect(await run(['draw-committed', 'draw-made'])).toEqual([]);
    expect(await run(['report-signed', 'draw-made'])).toEqual(['draw-logged']);
    expect(await run(['draw-committed', 'report-signed'])).toEqual(['draw-logged']);
    expect(await run(['draw-committed', 'draw-made'], signer, SERIES, true)).toEqual([
      'draw-logged',
    ]);
    expect(await run(['draw-committed', 'draw-made'], other, uuid('other series'))).toEqual([
      'draw-logged',
    ]);
  });
});
