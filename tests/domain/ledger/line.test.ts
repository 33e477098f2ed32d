import { createHash } from 'node:crypto';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { utf8 } from '@/domain/ledger/bytes';
import { canonicalJson } from '@/domain/ledger/canonical';
import { chainHead, chainNext, chainStart } from '@/domain/ledger/chain';
import { commit, commitHash, opens } from '@/domain/ledger/commitment';
import { lineText, type NewLine, parseLine } from '@/domain/ledger/line';
import { isLineKind, LINE_KINDS } from '@/domain/ledger/line-kind';
import { hex, unhex } from './check-value';
import { flipped } from './grown-tree';

const ID = '0195f3c0-0000-7000-8000-000000000001';
const good: NewLine = {
  series: ID,
  index: 7,
  kind: 'verdict-published',
  at: '2027-05-01T21:04:05.123Z',
  act: ID,
  commitments: { notice: 'ab'.repeat(32), appendix: 'cd'.repeat(32) },
  refs: { report: '6' },
};

describe('a ledger line', () => {
  it('is canonical, with its commitments in order of their roles', () => {
    expect(lineText(good)).toBe(
      `{"act":"${ID}","at":"2027-05-01T21:04:05.123Z","commitments":[{"commitment":"${'cd'.repeat(32)}","role":"appendix"},{"commitment":"${'ab'.repeat(32)}","role":"notice"}],"index":"7","kind":"verdict-published","refs":{"report":"6"},"series":"${ID}","type":"tagwire/line","v":"1"}`,
    );
  });

  it('holds nothing that could be a name', () => {
    const bad: readonly Partial<NewLine>[] = [
      { refs: { driver: 'A. Example' } },
      { refs: { 'Car 12J': '6' } },
      { series: 'northern-late-models' },
      { commitments: { 'A. Example': 'ab'.repeat(32) } },
      { commitments: { notice: 'AB'.repeat(32) } },
      { at: '2027-02-30T00:00:00.000Z' },
      { at: '2027-05-01T21:04:05Z' },
      { at: '2027-05-01T21:04:05.123+02:00' },
      { index: -1 },
      { index: 0.5 },
      { index: 2 ** 53 },
    ];
    for (const change of bad) expect(() => lineText({ ...good, ...change })).toThrow(TypeError);
  });

  it('is read back, a kind of a later version included', () => {
    const later = lineText(good).replace('verdict-published', 'wheel-weighed');
    expect(parseLine(later)).toMatchObject({ ok: true, value: { kind: 'wheel-weighed' } });
    expect(isLineKind('wheel-weighed')).toBe(false);
    expect(LINE_KINDS.every(isLineKind)).toBe(true);
    expect(new Set(LINE_KINDS).size).toBe(LINE_KINDS.length);
  });

  it('is refused in any other spelling, version or shape', () => {
    const text = lineText(good);
    const json = JSON.parse(text) as Record<string, unknown>;
    const swapped = { ...json, commitments: (json['commitments'] as unknown[]).toReversed() };
    for (const bad of [
      ` ${text}`,
      text.replace('"v":"1"', '"v":"2"'),
      text.replace('tagwire/line', 'other/line'),
      text.replace('"7"', '7'),
      text.replace('"7"', '"07"'),
      canonicalJson({ ...json, extra: '' }),
      canonicalJson(swapped),
      text.replace('"appendix"', '"notice"'),
    ]) {
      expect(parseLine(bad).ok, bad).toBe(false);
    }
  });
});

const nodeSha = (...parts: readonly (string | Uint8Array)[]): string => {
  const hash = createHash('sha256');
  for (const part of parts) hash.update(part);
  return hash.digest('hex');
};

describe('a salted commitment', () => {
  it('hashes tag, zero byte, salt and content hash, as documented', () => {
    const salt = unhex('01'.repeat(32));
    const expected = nodeSha('tagwire/commitment/1\0', salt, unhex(nodeSha('content')));
    expect(hex(commit(salt, utf8('content')))).toBe(expected);
  });

  it('opens with its own salt and content and with no others', () => {
    const hash = fc.uint8Array({ minLength: 32, maxLength: 32 });
    fc.assert(
      fc.property(hash, hash, fc.nat(255), (salt, content, bit) => {
        const commitment = commitHash(salt, content);
        expect(opens(commitment, salt, content)).toBe(true);
        expect(opens(commitment, flipped(salt, bit), content)).toBe(false);
        expect(opens(commitment, salt, flipped(content, bit))).toBe(false);
        expect(opens(flipped(commitment, bit), salt, content)).toBe(false);
        expect(opens(commitment, salt.slice(1), content)).toBe(false);
      }),
    );
    expect(() => commit(new Uint8Array(31), utf8(''))).toThrow(RangeError);
  });
});

describe('the chain of an inspection', () => {
  const batches = [{ n: '1' }, { n: '2' }, { struck: '1' }];

  it('hashes as documented', () => {
    const start = nodeSha('tagwire/chain/1\0', ID);
    expect(hex(chainStart(ID))).toBe(start);
    const next = nodeSha(
      'tagwire/chain/1',
      Uint8Array.of(1),
      unhex(start),
      unhex(nodeSha('{"n":"1"}')),
    );
    expect(hex(chainNext(chainStart(ID), { n: '1' }))).toBe(next);
  });

  it('has another head when a batch is changed, swapped, dropped, added or moved to another inspection', () => {
    const heads = [
      chainHead(ID, batches),
      chainHead(ID, [{ n: '1' }, { n: '3' }, { struck: '1' }]),
      chainHead(ID, batches.toReversed()),
      chainHead(ID, batches.slice(0, 2)),
      chainHead(ID, batches.slice(1)),
      chainHead(ID, [...batches, { n: '4' }]),
      chainHead(`${ID.slice(0, -1)}2`, batches),
    ].map(hex);
    expect(new Set(heads).size).toBe(heads.length);
  });

  it('links hashes only', () => {
    expect(() => chainNext(new Uint8Array(31), {})).toThrow(RangeError);
  });
});
