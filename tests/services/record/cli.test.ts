import { execFile } from 'node:child_process';
import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { promisify } from 'node:util';
import { PDFDocument } from 'pdf-lib';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { NOTICE_FILE_NAME } from '@/domain/ledger/verify/notice-file';
import { example, KEY, noticeFile, text } from '../../domain/ledger/example';

const run = promisify(execFile);
const root = join(import.meta.dirname, '../../..');
let folder: string;

beforeAll(() => {
  folder = mkdtempSync(join(tmpdir(), 'tagwire-cli-'));
});
afterAll(() => rmSync(folder, { recursive: true, force: true }));

const put = (name: string, content: string | Uint8Array): string => {
  const file = join(folder, name);
  writeFileSync(file, content);
  return file;
};

const call = async (script: string, ...args: readonly string[]) => {
  const file = join(root, `scripts/record/${script}.ts`);
  try {
    const { stdout } = await run(process.execPath, ['--import', 'tsx', file, ...args], {
      cwd: root,
    });
    return { code: 0, output: stdout };
  } catch (error) {
    const { code, stdout, stderr } = error as { code: number; stdout: string; stderr: string };
    return { code, output: `${stdout}${stderr}` };
  }
};

describe('npm run verify', () => {
  it('holds a notice’s file against the key given, and against nothing else', async () => {
    const file = put('notice.json', await noticeFile());
    const good = await call('verify', file, '--key', KEY);
    expect(good).toMatchObject({ code: 0 });
    const pinned = await call('verify', file, '--key-file', put('key.txt', `${KEY}\n`));
    expect(pinned).toMatchObject({ code: 0 });
    const without = await call('verify', file);
    expect(without.code).toBe(2);
    expect(without.output).toContain('--key');
    const altered = put('altered.json', (await noticeFile()).replace('no breach', 'breach'));
    expect((await call('verify', altered, '--key', KEY)).code).toBe(1);
    const other = KEY.replace(/\+[0-9a-f]{8}\+/, '+00000000+');
    expect((await call('verify', file, '--key', other)).code).toBe(1);
  });

  it('reads it out of a PDF, whose own hash it cannot know without the server', async () => {
    const document = await PDFDocument.create();
    document.addPage();
    await document.attach(new TextEncoder().encode(await noticeFile()), NOTICE_FILE_NAME, {});
    const file = put('notice.pdf', await document.save());
    const { code, output } = await call('verify', file, '--key', KEY);
    expect(output).toMatch(/not checked\s+This PDF is/);
    expect(code).toBe(2);
  });

  it('says in words what it cannot read, and how it is used', async () => {
    const missing = await call('verify', join(folder, 'no-such-file'));
    expect(missing.code).toBe(1);
    expect(missing.output).toContain('usage');
    expect((await call('verify')).output).toContain('usage');
    expect((await call('verify', put('text.txt', 'hello'))).code).toBe(1);
  });
});

describe('npm run recompute', () => {
  it('re-runs a draw from its two documents', async () => {
    const commitment = put('commitment.json', text.drawCommitment);
    const made = put('made.json', text.drawMade);
    const same = await call('recompute', commitment, made);
    expect(same).toMatchObject({ code: 0, output: expect.stringMatching(/^same/) });
    const forged = put('forged.json', text.drawMade.replace('"90X"', '"21"'));
    const other = await call('recompute', commitment, forged);
    expect(other.code).toBe(1);
    expect(other.output).toMatch(/DIFFERENT/);
    expect(example.made.selected).toHaveLength(2);
  });

  it('does not call a file worked out that it cannot read', async () => {
    const { code, output } = await call('recompute', put('no-case.json', '{}'));
    expect(code).toBe(1);
    expect(output).toContain('usage');
  });
});
