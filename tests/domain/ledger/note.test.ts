import { generateKeyPairSync, sign } from 'node:crypto';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { concat, toBase64, utf8 } from '@/domain/ledger/bytes';
import {
  checkpointText,
  openCheckpoint,
  parseCheckpointText,
  peekCheckpoint,
  signCheckpoint,
} from '@/domain/ledger/checkpoint';
import { formatNote, openNote, parseNote, signNote } from '@/domain/ledger/note/signed-note';
import {
  formatVerifierKey,
  parseVerifierKey,
  type VerifierKey,
  verifierKey,
  verifySignature,
} from '@/domain/ledger/note/verifier-key';
import { unhex } from './check-value';
import { testSigner } from './example';
import { flipped } from './grown-tree';

// The worked example of the C2SP signed-note specification (c2sp.org/signed-note, "Example").
const SPEC_KEY = 'example.com/foo+530d903a+AekyeRrm56hApGFkyQR4ZCbV54Id2LKaANYcrnKv3U2k';
const SPEC_TEXT = 'This is an example message.\n';
const SPEC_NOTE = `${SPEC_TEXT}
— example.com/foo Uw2QOkn8srV1yJGh2VYRlL1Tnagv1YEq6TfXppzi2ONncAlTgK7Ztg1ERYNZXsYjOBH3mFXmRKuwHjG1Yu72IneyaQM=
`;

// The example of the C2SP tlog-checkpoint specification; its key is not published with it.
const SPEC_CHECKPOINT = `example.com/behind-the-sofa
20852163
CsUYapGGPo4dkMgIAUqom/Xajj7h2fB2MPA3j2jxq2I=

— example.com/behind-the-sofa Az3grlgtzPICa5OS8npVmf1Myq/5IZniMp+ZJurmRDeOoRDe4URYN7u5/Zhcyv2q1gGzGku9nTo+zyWE+xeMcTOAYQ8=
`;

const key = (text: string): VerifierKey => {
  const parsed = parseVerifierKey(text);
  if (!parsed.ok) throw new Error(parsed.failure.detail);
  return parsed.value;
};

describe('Ed25519', () => {
  // RFC 8032 section 7.1, tests 1 and 2.
  it.each([
    [
      'd75a980182b10ab7d54bfed3c964073a0ee172f3daa62325af021a68f707511a',
      '',
      'e5564300c360ac729086e2cc806e828a84877f1eb8e5d974d873e065224901555fb8821590a33bacc61e39701cf9b46bd25bf5f0595bbe24655141438e7a100b',
    ],
    [
      '3d4017c3e843895a92b70aa74d1b7ebc9c982ccf2ec4968cc0cd55f12af4660c',
      '72',
      '92a009a9f0d4cab8720e820b5f642540a2b27b5416503f8fb3762223ebdb69da085ac1e43e15996e458f3613d0f11d8c387b2eaeb4302aeeb00d291612bb0c00',
    ],
  ])('verifies the published signature of %s', (publicKey, message, signature) => {
    const signer = verifierKey('example.org/key', unhex(publicKey));
    expect(verifySignature(signer, unhex(message), unhex(signature))).toBe(true);
    for (let bit = 0; bit < 512; bit += 7) {
      expect(verifySignature(signer, unhex(message), flipped(unhex(signature), bit))).toBe(false);
    }
    expect(verifySignature(signer, unhex(`${message}00`), unhex(signature))).toBe(false);
    expect(verifySignature(signer, unhex(message), unhex(signature).slice(1))).toBe(false);
  });

  it('refuses the key of small order, under which one signature fits every text', () => {
    const one = Uint8Array.from({ length: 32 }, (_, i) => (i === 0 ? 1 : 0));
    const anything = concat(one, new Uint8Array(32));
    expect(verifySignature(verifierKey('x', one), utf8('any text'), anything)).toBe(false);
  });

  it('verifies what OpenSSL signs', () => {
    fc.assert(
      fc.property(fc.uint8Array({ maxLength: 200 }), (message) => {
        const pair = generateKeyPairSync('ed25519');
        const spki = pair.publicKey.export({ format: 'der', type: 'spki' });
        const signer = verifierKey('x', Uint8Array.from(spki.subarray(-32)));
        const signature = Uint8Array.from(sign(null, message, pair.privateKey));
        expect(verifySignature(signer, message, signature)).toBe(true);
      }),
      { numRuns: 10 },
    );
  });
});

describe('a verifier key', () => {
  it('is the published one, byte for byte', () => {
    expect(key(SPEC_KEY)).toMatchObject({ name: 'example.com/foo', id: '530d903a' });
    expect(formatVerifierKey(key(SPEC_KEY))).toBe(SPEC_KEY);
  });

  it('is refused with any character changed or missing', () => {
    for (let at = 0; at < SPEC_KEY.length; at++) {
      expect(parseVerifierKey(SPEC_KEY.slice(0, at) + SPEC_KEY.slice(at + 1)).ok).toBe(false);
      const next = String.fromCharCode(SPEC_KEY.charCodeAt(at) + 1);
      expect(parseVerifierKey(SPEC_KEY.slice(0, at) + next + SPEC_KEY.slice(at + 1)).ok).toBe(
        false,
      );
    }
  });
});

describe('a signed note', () => {
  it('opens the published example and writes it back the same', () => {
    const opened = openNote(SPEC_NOTE, [key(SPEC_KEY)]);
    expect(opened).toEqual({ ok: true, value: { text: SPEC_TEXT, signedBy: [key(SPEC_KEY)] } });
    const parsed = parseNote(SPEC_NOTE);
    expect(parsed.ok && formatNote(parsed.value)).toBe(SPEC_NOTE);
  });

  it('does not open with any character changed', () => {
    for (let at = 0; at < SPEC_NOTE.length; at++) {
      const next = SPEC_NOTE[at] === 'A' ? 'B' : 'A';
      const changed = SPEC_NOTE.slice(0, at) + next + SPEC_NOTE.slice(at + 1);
      expect(openNote(changed, [key(SPEC_KEY)]).ok, changed).toBe(false);
    }
  });

  it('passes over unknown signers, and is refused by one bad signature of a known key', async () => {
    const [a, b] = [testSigner('a', 'a'), testSigner('b', 'b')];
    const note = await signNote('text\n\nmore\n', [a, b]);
    expect(openNote(note, [a.key])).toMatchObject({ ok: true, value: { text: 'text\n\nmore\n' } });
    expect(openNote(note, [testSigner('a', 'other').key]).ok).toBe(false);
    expect(openNote(note, []).ok).toBe(false);
    const parsed = parseNote(note);
    if (!parsed.ok) throw new Error('not a note');
    const [first, second] = parsed.value.signatures;
    const bad = { ...second!, signature: flipped(second!.signature, 3) };
    const broken = formatNote({ ...parsed.value, signatures: [first!, bad] });
    expect(openNote(broken, [a.key]).ok).toBe(true);
    expect(openNote(broken, [a.key, b.key]).ok).toBe(false);
  });

  it('accepts sixteen signatures and refuses control characters', async () => {
    const signers = Array.from({ length: 16 }, (_, i) => testSigner(`signer/${i}`, `s${i}`));
    expect(openNote(await signNote('x\n', signers), [signers[15]!.key]).ok).toBe(true);
    for (const bad of ['a\u0000b\n', 'a\tb\n', 'a\r\n', 'no newline']) {
      await expect(signNote(bad, signers)).rejects.toThrow(TypeError);
      expect(parseNote(`${bad}\n— x ${toBase64(concat(utf8('abcd'), utf8('s')))}\n`).ok).toBe(
        false,
      );
    }
  });
});

describe('a checkpoint', () => {
  const root = unhex('ab'.repeat(32));
  const signer = testSigner('records.example/ledger/one', 'one');

  it('reads the published example and writes its text the same', () => {
    const peeked = peekCheckpoint(SPEC_CHECKPOINT);
    expect(peeked).toMatchObject({
      ok: true,
      value: { origin: 'example.com/behind-the-sofa', size: 20852163 },
    });
    if (!peeked.ok) return;
    expect(SPEC_CHECKPOINT.startsWith(`${checkpointText(peeked.value)}\n`)).toBe(true);
  });

  it('opens with the key of its own ledger only', async () => {
    const head = { origin: 'records.example/ledger/one', size: 12, root };
    const signed = await signCheckpoint(head, [signer]);
    expect(openCheckpoint(signed, [signer.key])).toEqual({ ok: true, value: head });
    const other = testSigner('records.example/ledger/two', 'two');
    const borrowed = await signCheckpoint(head, [other]);
    expect(openCheckpoint(borrowed, [other.key]).ok).toBe(false);
  });

  it('does not open with any character changed', async () => {
    const signed = await signCheckpoint({ origin: signer.key.name, size: 12, root }, [signer]);
    for (let at = 0; at < signed.length; at++) {
      const next = signed[at] === '1' ? '2' : '1';
      const changed = signed.slice(0, at) + next + signed.slice(at + 1);
      expect(openCheckpoint(changed, [signer.key]).ok, changed).toBe(false);
    }
  });

  it.each([
    'o\n01\nAAAA\n',
    `o\n01\n${toBase64(new Uint8Array(32))}\n`,
    `o\n1\n${toBase64(new Uint8Array(31))}\n`,
    `\n1\n${toBase64(new Uint8Array(32))}\n`,
    `o\n1\n${toBase64(new Uint8Array(32))}`,
    `o\n1\n${toBase64(new Uint8Array(32))}\n\nx\n`,
    `o\n99999999999999999\n${toBase64(new Uint8Array(32))}\n`,
  ])('is refused: %j', (text) => {
    expect(parseCheckpointText(text).ok).toBe(false);
  });

  it('carries the time of its signing in an extension line, once, and as an instant', async () => {
    const signedAt = '2027-05-01T16:00:03.250Z';
    const head = { origin: signer.key.name, size: 12, root, signedAt };
    const signed = await signCheckpoint(head, [signer]);
    expect(openCheckpoint(signed, [signer.key])).toEqual({ ok: true, value: head });
    const later = signed.replace('03.250Z', '04.250Z');
    expect(openCheckpoint(later, [signer.key]).ok).toBe(false);
    const text = checkpointText(head);
    const { signedAt: _, ...without } = head;
    expect(text.startsWith(checkpointText(without))).toBe(true);
    for (const wrong of [
      `${text}tagwire/signed-at ${signedAt}\n`,
      text.replace('.250Z', 'Z'),
      text.replace('2027-05-01T', '2027-05-01 '),
    ])
      expect(parseCheckpointText(wrong).ok, wrong).toBe(false);
    expect(() => checkpointText({ ...head, signedAt: 'yesterday' })).toThrow(TypeError);
  });

  it('may carry extension lines, which it does not read', () => {
    const text = `o\n0\n${toBase64(new Uint8Array(32))}\nextension\n`;
    expect(parseCheckpointText(text)).toMatchObject({ ok: true, value: { origin: 'o', size: 0 } });
  });
});
