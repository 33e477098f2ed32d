import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  bigEndian,
  findBase64,
  findHex,
  findWhole,
  sameBytes,
  toBase64,
  toHex,
} from '@/domain/ledger/bytes';

describe('bytes as text', () => {
  it('come back from base64 and hex, and agree with the runtime', () => {
    fc.assert(
      fc.property(fc.uint8Array({ minLength: 1 }), (bytes) => {
        expect(toBase64(bytes)).toBe(Buffer.from(bytes).toString('base64'));
        expect(findBase64(toBase64(bytes))).toEqual(bytes);
        expect(findHex(toHex(bytes), bytes.length)).toEqual(bytes);
      }),
    );
  });

  // RFC 4648 section 10.
  it.each([
    ['f', 'Zg=='],
    ['fo', 'Zm8='],
    ['foo', 'Zm9v'],
    ['foobar', 'Zm9vYmFy'],
  ])('gives the published base64 of %s', (text, encoded) => {
    expect(toBase64(new TextEncoder().encode(text))).toBe(encoded);
  });

  it.each(['', 'Zh==', 'Zm9=', 'Zg', 'Zg=', 'Zg==\n', 'Zm9v=', 'Z_8=', ' Zg=', 'Zg==Zg=='])(
    'refuses base64 in another spelling: %j',
    (text) => {
      expect(findBase64(text)).toBeUndefined();
    },
  );

  it('refuses hex of another length or in capitals', () => {
    for (const text of ['ab', 'abcd12', 'ABCD', 'abcg', '0xab']) {
      expect(findHex(text, 2)).toBeUndefined();
    }
  });

  it('reads whole numbers in one spelling, as far as they are exact', () => {
    expect(findWhole('0')).toBe(0);
    expect(findWhole('9007199254740991')).toBe(Number.MAX_SAFE_INTEGER);
    for (const text of ['', '01', '-1', '+1', '1.0', '1e3', ' 1', '9007199254740992']) {
      expect(findWhole(text)).toBeUndefined();
    }
  });

  it('writes numbers most significant first', () => {
    expect(toHex(bigEndian(0x010203, 8))).toBe('0000000000010203');
    expect(toHex(bigEndian(Number.MAX_SAFE_INTEGER, 8))).toBe('001fffffffffffff');
  });

  it('compares by content', () => {
    expect(sameBytes(Uint8Array.of(1, 2), Uint8Array.of(1, 2))).toBe(true);
    expect(sameBytes(Uint8Array.of(1, 2), Uint8Array.of(1, 3))).toBe(false);
    expect(sameBytes(Uint8Array.of(1, 2), Uint8Array.of(1))).toBe(false);
  });
});
