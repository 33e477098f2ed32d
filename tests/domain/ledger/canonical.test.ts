import { createHash } from 'node:crypto';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { sha256, utf8 } from '@/domain/ledger/bytes';
import { canonicalDocument, canonicalJson, parseCanonical } from '@/domain/ledger/canonical';
import { checkValue, hex } from './check-value';
import fixedNumbers from './number-stream.json';

describe('SHA-256', () => {
  it('gives the example values of FIPS 180-4', () => {
    const { inputs, expected } = checkValue<{ ascii: string[] }, { sha256: string[] }>(
      'sha256-abc',
    );
    expect(inputs.ascii.map((text) => hex(sha256(utf8(text))))).toEqual(expected.sha256);
  });
});

describe('canonicalJson', () => {
  it.each(['jcs-arrays', 'jcs-french', 'jcs-structures', 'jcs-unicode', 'jcs-values'])(
    'gives the published bytes of %s',
    (id) => {
      const { inputs, expected } = checkValue<{ json: string }, { utf8_hex: string }>(id);
      expect(hex(utf8(canonicalJson(JSON.parse(inputs.json))))).toBe(expected.utf8_hex);
    },
  );

  it('writes the numbers of RFC 8785 appendix B', () => {
    const { inputs, expected } = checkValue<{ ieee754_hex: string[] }, { text: string[] }>(
      'jcs-numbers-appendixB',
    );
    const written = inputs.ieee754_hex.map((bits) =>
      canonicalJson(Buffer.from(bits, 'hex').readDoubleBE(0)),
    );
    expect(written).toEqual(expected.text);
  });

  it('writes the first 100,000 numbers of the published number stream', () => {
    const { inputs, expected } = checkValue<{ lines: number[] }, { sha256: string[] }>(
      'jcs-number-stream',
    );
    const sums: string[] = [];
    const hash = createHash('sha256');
    let count = 0;
    for (const bits of numberStream(100_000)) {
      const view = new DataView(new ArrayBuffer(8));
      view.setBigUint64(0, bits);
      hash.update(`${bits.toString(16)},${canonicalJson(view.getFloat64(0))}\n`);
      count++;
      if (inputs.lines.includes(count)) sums.push(hash.copy().digest('hex'));
    }
    expect(sums).toEqual(expected.sha256.slice(0, 3));
  });

  it.each([Number.NaN, Number.POSITIVE_INFINITY, undefined, '\ud800', { '\udc00': '' }])(
    'throws on %s',
    (value) => {
      expect(() => canonicalJson(value)).toThrow();
    },
  );
});

/**
 * The stream of the RFC 8785 companion test data: fixed bit patterns, 2,000 successive ones from
 * the smallest normal number, then a chain of SHA-256 over itself read as little-endian doubles,
 * without zero, infinity and NaN.
 */
function* numberStream(count: number): Generator<bigint> {
  let left = count;
  for (const bits of fixedNumbers.ieee754_hex) yield BigInt(`0x${bits}`);
  left -= fixedNumbers.ieee754_hex.length;
  for (let i = 0n; i < 2000n && left > 0; i++, left--) yield 0x0010000000000000n + i;
  for (let block = Buffer.alloc(32); left > 0; ) {
    block = createHash('sha256').update(block).digest();
    for (let at = 0; at < 32 && left > 0; at += 8) {
      const value = block.readDoubleLE(at);
      if (value === 0 || !Number.isFinite(value)) continue;
      yield block.readBigUInt64LE(at);
      left--;
    }
  }
}

describe('canonicalDocument', () => {
  it('names every number and every impossible value by its place', () => {
    const refused = canonicalDocument({ a: [1, '2'], 'b/c': { d: undefined }, e: 'x\udfff' });
    expect(refused).toMatchObject({
      ok: false,
      failure: {
        faults: [
          { pointer: '/a/0', detail: 'Write the number as text.' },
          { pointer: '/b~1c/d' },
          { pointer: '/e', detail: 'The text is not valid Unicode.' },
        ],
      },
    });
  });

  it('refuses dates, class instances, functions and depth without end', () => {
    const deep = JSON.parse(`${'['.repeat(40)}${']'.repeat(40)}`) as unknown;
    for (const value of [new Date(0), new Map(), () => '', 1n, deep]) {
      expect(canonicalDocument({ value }).ok).toBe(false);
    }
  });

  it('reads back exactly what it wrote, whatever the order of keys', () => {
    fc.assert(
      fc.property(json(), (value) => {
        const written = canonicalDocument(value);
        expect(written.ok).toBe(true);
        if (!written.ok) return;
        expect(JSON.parse(written.value)).toEqual(value);
        expect(parseCanonical(written.value).ok).toBe(true);
        expect(canonicalDocument(reversed(value))).toEqual(written);
      }),
    );
  });

  it('reads no other spelling of the same document', () => {
    for (const text of [
      '{"b":"", "a":""}',
      '{"b":"","a":""}',
      '{"a":"","a":""}',
      '"\\u0061"',
      '{',
    ]) {
      expect(parseCanonical(text).ok).toBe(false);
    }
  });
});

const json = () =>
  fc.letrec<{ json: unknown }>((tie) => ({
    json: fc.oneof(
      { maxDepth: 4 },
      fc.string({ unit: 'binary' }),
      fc.boolean(),
      fc.constant(null),
      fc.array(tie('json'), { maxLength: 4 }),
      fc.dictionary(
        fc.string().filter((key) => key !== '__proto__'),
        tie('json'),
        {
          maxKeys: 4,
          noNullPrototype: true,
        },
      ),
    ),
  })).json;

const reversed = (value: unknown): unknown => {
  if (Array.isArray(value)) return value.map(reversed);
  if (value === null || typeof value !== 'object') return value;
  return Object.fromEntries(
    Object.entries(value)
      .reverse()
      .map(([key, item]) => [key, reversed(item)]),
  );
};
