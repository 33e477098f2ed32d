import { readFileSync } from 'node:fs';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { toHex } from '@/domain/ledger/bytes';
import { signCheckpoint } from '@/domain/ledger/checkpoint';
import { lineLeaf, lineText } from '@/domain/ledger/line';
import { fillPlan, planConsistency, planInclusion } from '@/domain/ledger/proof';
import { readNoticeFile } from '@/domain/ledger/verify/notice-file';
import { conclude } from '@/domain/ledger/verify/step';
import { verifyNotice } from '@/domain/ledger/verify-notice';
import { ORIGIN, SERIES, signer } from './example';
import { grow } from './grown-tree';
import { blocksOf } from './record-format';
import {
  chainHead,
  checkConsistency,
  checkDraw,
  checkHandOver,
  checkLine,
  checkNotice,
  checkPdf,
  readHead,
} from './stranger/verifier';

const shown = blocksOf('example');
const block = (name: string): string => {
  const content = shown.get(name);
  if (content === undefined) throw new Error(`No example ${name}`);
  return content;
};
const rows = (name: string): Readonly<Record<string, string>> =>
  Object.fromEntries(
    block(name)
      .split('\n')
      .map((row) => row.split(' = ', 2)),
  );
const key = rows('key')['verifier key'] ?? '';
const head = (name: string) => readHead(`${block(name)}\n`, key);

describe('a stranger with the page alone', () => {
  it('imports nothing but the runtime’s hash and signature', () => {
    const source = readFileSync(new URL('./stranger/verifier.ts', import.meta.url), 'utf8');
    const imports = [...source.matchAll(/\bfrom '([^']+)'|import\(/g)].map(([, from]) => from);
    expect(imports).toEqual(['node:crypto']);
  });

  it('verifies the notice and its PDF', () => {
    const { line, document } = checkNotice(block('notice file'), key);
    expect(document).toBe(block('document'));
    checkPdf(Buffer.from(`${block('pdf')}\n`), block('pdf file'), line, key);
    expect(() => checkPdf(Buffer.from(block('pdf')), block('pdf file'), line, key)).toThrow(
      'another pdf',
    );
  });

  it('verifies every line, the heads and what lies between them', () => {
    const lines = block('lines').split('\n');
    expect(JSON.parse(lines[4] ?? '')).toEqual(checkNotice(block('notice file'), key).line);
    checkConsistency(
      head('checkpoint'),
      head('newer checkpoint'),
      block('consistency').split('\n'),
    );
    const shorter = block('consistency').split('\n').slice(1);
    expect(() => checkConsistency(head('checkpoint'), head('newer checkpoint'), shorter)).toThrow();
    expect(() => checkConsistency(head('newer checkpoint'), head('checkpoint'), [])).toThrow();
  });

  it('reads when a head was signed, where the head says it', () => {
    const timed = head('checkpoint with its time');
    expect(timed.signedAt).toBe('2027-05-01T16:00:03.250Z');
    expect(head('newer checkpoint').signedAt).toBe('');
    expect(timed.root.equals(head('newer checkpoint').root)).toBe(true);
    const later = block('checkpoint with its time').replace('03.250Z', '04.250Z');
    expect(() => readHead(`${later}\n`, key)).toThrow('the signature is wrong');
  });

  it('follows the key', () => {
    expect(checkHandOver(block('hand-over'), key)).toMatch(new RegExp(`^${ORIGIN}\\+`));
  });

  it('computes the chain the report’s line carries', () => {
    const chain = rows('chain');
    const computed = chainHead(chain['inspection'] ?? '', [
      chain['batch 1'] ?? '',
      chain['batch 2'] ?? '',
    ]);
    expect(computed).toBe(chain['h2']);
    expect(JSON.parse(block('lines').split('\n')[3] ?? '')).toMatchObject({
      refs: { chain: computed },
    });
  });

  it('re-runs the draw', () => {
    const cars = checkDraw(block('draw-commitment'), block('draw-made'));
    expect(cars.length).toBe(2);
    for (const [from, to] of [
      ['"14"', '"13"'],
      [`"car":"${cars[0]}","number"`, '"car":"99","number"'],
      ['"substitute"', '"missing"'],
    ] as const) {
      const changed = block('draw-made').replace(from, to);
      expect(changed).not.toBe(block('draw-made'));
      expect(() => checkDraw(block('draw-commitment'), changed)).toThrow();
    }
  });

  it('agrees with the product about ledgers of any size', async () => {
    const text = (index: number) =>
      lineText({
        series: SERIES,
        index,
        kind: 'report-signed',
        at: '2027-05-01T00:00:00.000Z',
        act: SERIES,
        commitments: {},
      });
    const lines = Array.from({ length: 40 }, (_, i) => text(i));
    const tree = grow(40, lines.map(lineLeaf));
    const sign = (size: number) =>
      signCheckpoint({ origin: ORIGIN, size, root: tree.root(size) }, [signer]);
    const path = (plan: ReturnType<typeof planInclusion>) => fillPlan(plan, tree.read).map(toHex);
    await fc.assert(
      fc.asyncProperty(fc.integer({ min: 1, max: 40 }), fc.nat(), async (size, n) => {
        const index = n % size;
        const first = index + 1;
        const checkpoint = await sign(size);
        const proof = {
          line: lines[index] ?? '',
          path: path(planInclusion(index, size)),
          checkpoint,
        };
        expect(checkLine(proof, key).index).toBe(String(index));
        const consistency = path(planConsistency(first, size));
        checkConsistency(readHead(await sign(first), key), readHead(checkpoint, key), consistency);
        if (size > 1) {
          const other = lines[(index + 1) % size] ?? '';
          expect(() => checkLine({ ...proof, line: other }, key)).toThrow();
        }
      }),
      { numRuns: 60 },
    );
  });

  it('refuses what the product refuses, whichever character of a notice is changed', () => {
    const written = block('notice file');
    const refuses = (check: () => unknown): boolean => {
      try {
        check();
        return false;
      } catch {
        return true;
      }
    };
    fc.assert(
      fc.property(fc.nat(written.length - 1), fc.constantFrom('0', 'b', 'Q'), (at, char) => {
        fc.pre(written[at] !== char);
        const changed = written.slice(0, at) + char + written.slice(at + 1);
        const file = readNoticeFile(changed);
        const product =
          !file.ok || conclude(verifyNotice({ file: file.value, trustedKeys: [key] })) === 'failed';
        expect(product).toBe(true);
        // Misnamed members and unknown versions are refused by the product before any hashing.
        if (file.ok)
          expect(
            refuses(() => checkNotice(changed, key)),
            changed,
          ).toBe(true);
      }),
      { numRuns: 300 },
    );
  });
});
