import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { sha256, toHex } from '@/domain/ledger/bytes';
import { canonicalJson } from '@/domain/ledger/canonical';
import { originOf, signCheckpoint } from '@/domain/ledger/checkpoint';
import { commit } from '@/domain/ledger/commitment';
import { lineText, type NewLine } from '@/domain/ledger/line';
import type { NoteSigner } from '@/domain/ledger/note/signed-note';
import { formatVerifierKey } from '@/domain/ledger/note/verifier-key';
import { followKeys } from '@/domain/ledger/verify/follow-keys';
import { type NoticeFile, readNoticeFile, readPdfFile } from '@/domain/ledger/verify/notice-file';
import { conclude, type Step } from '@/domain/ledger/verify/step';
import { type NoticeToVerify, verifyNotice } from '@/domain/ledger/verify-notice';
import {
  commitments,
  example,
  extensionOf,
  KEY,
  noticeFile,
  ORIGIN,
  pdf,
  pdfFile,
  proofIn,
  proofOf,
  SERIES,
  saltOf,
  seedOf,
  signer,
  testSigner,
  text,
  tree,
  uuid,
} from './example';

const outcomes = (steps: readonly Step[]) =>
  Object.fromEntries(steps.map((step) => [step.id, step.outcome]));

const value = <T>(result: { ok: true; value: T } | { ok: false }): T => {
  if (!result.ok) throw new Error('refused');
  return result.value;
};

const good = async (): Promise<NoticeToVerify> => ({
  file: value(readNoticeFile(await noticeFile())),
  trustedKeys: [KEY],
  pdf: { sha256: sha256(pdf), file: value(readPdfFile(await pdfFile())) },
  since: await extensionOf(5, 7),
});

const withFile = async (change: (file: NoticeFile) => Partial<NoticeFile>) => {
  const notice = await good();
  return verifyNotice({ ...notice, file: { ...notice.file, ...change(notice.file) } });
};

describe('verifyNotice', () => {
  it('passes every step for a notice as published, and says what each proves and does not', async () => {
    const steps = verifyNotice(await good());
    expect(outcomes(steps)).toEqual({
      'key-known': 'passed',
      'document-form': 'passed',
      'document-committed': 'passed',
      'line-form': 'passed',
      'checkpoint-signed': 'passed',
      'same-ledger': 'passed',
      'line-included': 'passed',
      'pdf-line-form': 'passed',
      'pdf-checkpoint-signed': 'passed',
      'pdf-same-ledger': 'passed',
      'pdf-line-included': 'passed',
      'pdf-committed': 'passed',
      'only-appended': 'passed',
    });
    expect(conclude(steps)).toBe('passed');
    for (const step of steps) {
      for (const words of [step.checked, step.found, step.proves, step.doesNotProve]) {
        expect(words).toMatch(/^[A-Z0-9].*\.$|^records\.example.*\.$/);
      }
    }
  });

  it('is incomplete, not passed, without a key from elsewhere or without the PDF’s line', async () => {
    const notice = await good();
    const noKey = verifyNotice({ ...notice, trustedKeys: [] });
    expect(outcomes(noKey)['key-known']).toBe('not checked');
    expect(conclude(noKey)).toBe('not checked');
    const noLine = verifyNotice({ ...notice, pdf: { sha256: sha256(pdf) } });
    expect(outcomes(noLine)['pdf-committed']).toBe('not checked');
    expect(conclude(noLine)).toBe('not checked');
    expect(conclude([])).toBe('not checked');
  });

  it('names an altered notice', async () => {
    const steps = await withFile((file) => ({
      document: file.document.replace('no breach', 'breach'),
    }));
    expect(steps.filter((step) => step.outcome === 'failed').map((step) => step.id)).toEqual([
      'document-committed',
    ]);
  });

  it('names a notice spelled another way', async () => {
    const steps = await withFile((file) => ({ document: ` ${file.document}` }));
    expect(outcomes(steps)).toMatchObject({
      'document-form': 'failed',
      'document-committed': 'failed',
    });
  });

  it('names another salt or role', async () => {
    for (const change of [{ salt: saltOf('report') }, { role: 'report' }]) {
      expect(outcomes(await withFile(() => change))).toMatchObject({
        'document-committed': 'failed',
        'line-included': 'passed',
      });
    }
  });

  it('names an altered line, which no longer leads to the signed root', async () => {
    const steps = await withFile((file) => ({
      proof: { ...file.proof, line: file.proof.line.replace('14:00', '13:00') },
    }));
    expect(outcomes(steps)).toMatchObject({ 'line-form': 'passed', 'line-included': 'failed' });
  });

  it('names a head signed by a stranger in the series’ name', async () => {
    const forger = testSigner(ORIGIN, 'forger');
    const forged = await proofOf(4, 5, [forger]);
    const key = formatVerifierKey(forger.key);
    expect(outcomes(await withFile(() => ({ proof: forged, key })))).toMatchObject({
      'key-known': 'failed',
      'checkpoint-signed': 'failed',
      'line-included': 'not checked',
    });
    const notice = await good();
    const alone = verifyNotice({ file: { ...notice.file, proof: forged, key }, trustedKeys: [] });
    expect(outcomes(alone)['key-known']).toBe('not checked');
    expect(conclude(alone)).not.toBe('passed');
  });

  it('names a notice of another series', async () => {
    const foreign = testSigner('records.example/ledger/another', 'foreign');
    const proof = (await good()).file.proof;
    const steps = verifyNotice({
      file: {
        ...(await good()).file,
        proof: {
          ...proof,
          checkpoint: await signCheckpoint(
            { origin: foreign.key.name, size: 5, root: tree.root(5) },
            [foreign],
          ),
        },
        key: formatVerifierKey(foreign.key),
      },
      trustedKeys: [formatVerifierKey(foreign.key)],
    });
    expect(outcomes(steps)).toMatchObject({
      'checkpoint-signed': 'passed',
      'same-ledger': 'failed',
    });
  });

  it('names an altered PDF, and a PDF of another notice', async () => {
    const notice = await good();
    const altered = verifyNotice({
      ...notice,
      pdf: { sha256: sha256(pdf.with(9, 0)), ...(notice.pdf?.file && { file: notice.pdf.file }) },
    });
    expect(outcomes(altered)).toMatchObject({
      'pdf-line-included': 'passed',
      'pdf-committed': 'failed',
    });
    const report = { ...notice.file, proof: await proofOf(3, 5), role: 'report' };
    const other = verifyNotice({
      ...notice,
      file: { ...report, document: text.report, salt: saltOf('report') },
    });
    expect(outcomes(other)).toMatchObject({
      'document-committed': 'passed',
      'pdf-committed': 'failed',
    });
  });

  it('takes the PDF’s hash from a line made for that, in the notice’s own ledger', async () => {
    const notice = await good();
    const foreign = testSigner(originOf('records.example/ledger', uuid('other series')), 'foreign');
    const trustedKeys = [KEY, formatVerifierKey(foreign.key)];
    const written = (change: Partial<NewLine>) =>
      lineText({
        series: SERIES,
        index: 0,
        act: SERIES,
        at: '2027-05-01T20:00:00.000Z',
        kind: 'notice-pdf',
        commitments: { pdf: toHex(commit(seedOf('salt of pdf'), pdf)) },
        refs: { notice: '4' },
        ...change,
      });
    const outcome = async (line: string, by: NoteSigner) => {
      const file = { ...notice.pdf!.file!, proof: await proofIn([line], 0, by) };
      const steps = verifyNotice({ ...notice, trustedKeys, pdf: { sha256: sha256(pdf), file } });
      expect(outcomes(steps)['pdf-line-included']).toBe('passed');
      expect(outcomes(steps)['pdf-same-ledger']).toBe('passed');
      return outcomes(steps)['pdf-committed'];
    };
    expect(await outcome(written({}), signer)).toBe('passed');
    expect(await outcome(written({ kind: 'report-signed' }), signer)).toBe('failed');
    expect(await outcome(written({ refs: {} }), signer)).toBe('failed');
    expect(await outcome(written({ series: uuid('other series') }), foreign)).toBe('failed');
  });

  it('takes a newer head of the same ledger only', async () => {
    const notice = await good();
    const foreign = testSigner('records.example/ledger/another', 'foreign');
    const head = { origin: foreign.key.name, size: 7, root: tree.root(7) };
    const since = { ...notice.since!, checkpoint: await signCheckpoint(head, [foreign]) };
    const trustedKeys = [KEY, formatVerifierKey(foreign.key)];
    expect(outcomes(verifyNotice({ ...notice, since, trustedKeys }))['only-appended']).toBe(
      'failed',
    );
  });

  it('names a history that was rewritten since', async () => {
    const notice = await good();
    const since = await extensionOf(4, 7);
    expect(outcomes(verifyNotice({ ...notice, since }))['only-appended']).toBe('failed');
  });

  it('never passes a file with any one character changed', async () => {
    const written = await noticeFile();
    fc.assert(
      fc.property(fc.nat(written.length - 1), fc.constantFrom('0', 'a', 'Z', ' '), (at, char) => {
        fc.pre(written[at] !== char);
        const changed = readNoticeFile(written.slice(0, at) + char + written.slice(at + 1));
        if (!changed.ok) return;
        const steps = verifyNotice({ file: changed.value, trustedKeys: [KEY] });
        expect(conclude(steps)).toBe('failed');
      }),
      { numRuns: 400 },
    );
  });

  it('refuses what is no proof file, and a key that is no key', async () => {
    for (const bad of ['', '{}', 'null', (await noticeFile()).replace('"v":"1"', '"v":"2"')]) {
      expect(readNoticeFile(bad).ok).toBe(false);
      expect(readPdfFile(bad).ok).toBe(false);
    }
    const steps = verifyNotice({ ...(await good()), trustedKeys: ['nonsense'] });
    expect(outcomes(steps)).toEqual({ 'key-known': 'failed' });
  });
});

describe('followKeys', () => {
  const published = async () => ({
    document: text.key,
    salt: saltOf('key'),
    proof: await proofOf(6, 7),
  });

  it('goes from a trusted key to the one it handed over to', async () => {
    const { keys, steps } = followKeys([signer.key], [await published()]);
    expect(keys).toEqual([signer.key, example.nextSigner.key]);
    expect(conclude(steps)).toBe('passed');
  });

  it('does not follow a hand-over the trusted key did not sign, or of other content', async () => {
    const stranger = testSigner(ORIGIN, 'stranger');
    const good = await published();
    const selfSigned = { ...good, proof: await proofOf(6, 7, [example.nextSigner]) };
    const another = {
      ...good,
      document: good.document.replace(
        formatVerifierKey(example.nextSigner.key),
        formatVerifierKey(stranger.key),
      ),
    };
    for (const bad of [selfSigned, another, { ...good, salt: saltOf('notice') }]) {
      const followed = followKeys([signer.key], [bad]);
      expect(followed.keys).toEqual([signer.key]);
      expect(conclude(followed.steps)).toBe('failed');
    }
    expect(followKeys([stranger.key], [good]).keys).toEqual([stranger.key]);
  });

  it('follows only a line of that kind, to a key of this ledger, from a key it knows', async () => {
    const next = formatVerifierKey(example.nextSigner.key);
    const elsewhere = formatVerifierKey(testSigner('records.example/other', 'elsewhere').key);
    const follow = async (kind: NewLine['kind'], key: string, replaces: string) => {
      const document = canonicalJson({ v: '1', type: 'tagwire/key', key, replaces });
      const line = lineText({
        series: SERIES,
        index: 0,
        act: SERIES,
        at: '2027-05-01T20:00:00.000Z',
        kind,
        commitments: commitments('key', { key: document }),
      });
      const proof = await proofIn([line], 0, signer);
      return followKeys([signer.key], [{ document, salt: saltOf('key'), proof }]).keys.length;
    };
    expect(await follow('key-published', next, KEY)).toBe(2);
    expect(await follow('report-signed', next, KEY)).toBe(1);
    expect(await follow('key-published', elsewhere, KEY)).toBe(1);
    expect(await follow('key-published', next, next)).toBe(1);
    expect(await follow('key-published', next, '')).toBe(1);
  });
});
