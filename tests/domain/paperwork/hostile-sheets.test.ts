import { execFile } from 'node:child_process';
import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { promisify } from 'node:util';
import { build } from 'vite';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { MOST_BYTES } from '@/domain/paperwork/file/limits';
import { MOST_SPENT } from '@/services/paperwork/sheet/spent';
import type { ReadOne } from '../../support/hostile/read-one';
import { HOSTILE_SHEETS } from '../../support/hostile/sheets';

const run = promisify(execFile);
const root = fileURLToPath(new URL('../../..', import.meta.url));

/** Kilobytes that reading one file may add to a process; the heap itself is held to less. */
const MOST_MEMORY = 90_000;
const HEAP_MEGABYTES = 64;

let folder: string;

beforeAll(async () => {
  folder = mkdtempSync(join(tmpdir(), 'tagwire-hostile-'));
  await build({
    root,
    configFile: false,
    logLevel: 'silent',
    resolve: { alias: { '@': join(root, 'src') } },
    ssr: { noExternal: true },
    build: {
      ssr: join(root, 'tests/support/hostile/read-one.ts'),
      outDir: folder,
      target: 'node20',
      rollupOptions: { output: { entryFileNames: 'read-one.mjs' } },
    },
  });
}, 120_000);
afterAll(() => rmSync(folder, { recursive: true, force: true }));

const readInChild = async (bytes: Uint8Array): Promise<ReadOne> => {
  const path = join(folder, 'file');
  writeFileSync(path, bytes);
  const { stdout } = await run(process.execPath, [
    `--max-old-space-size=${HEAP_MEGABYTES}`,
    join(folder, 'read-one.mjs'),
    path,
  ]);
  return JSON.parse(stdout) as ReadOne;
};

describe('hostile sheets, each in a process with a bounded heap', () => {
  test.each(HOSTILE_SHEETS)('$name', async ({ name, make, words }) => {
    const bytes = make();
    expect(bytes.length).toBeLessThanOrEqual(MOST_BYTES.sheet);
    const read = await readInChild(bytes);
    const { spent, peak, before, milliseconds } = read;
    console.info(
      `${name}: ${bytes.length} B; + ${Math.round((peak - before) / 1_000)} MB, peak ${Math.round(peak / 1_000)} MB; ${milliseconds} ms; unpacked ${spent.unpackedBytes} B, ${spent.tags} tags, ${spent.rows} rows`,
    );
    if (words === undefined) expect(read.answer).toMatch(/^\d+ values$/);
    else expect(read.answer).toContain(words);
    expect(read.refused).toBe(words !== undefined);
    expect(peak - before).toBeLessThan(MOST_MEMORY);
    expect(spent.unpackedBytes).toBeLessThanOrEqual(MOST_SPENT.unpackedBytes);
    // The one that goes beyond a bound is counted before it is refused.
    expect(spent.tags).toBeLessThanOrEqual(MOST_SPENT.tags + 1);
    expect(spent.rows).toBeLessThanOrEqual(MOST_SPENT.rows + 1);
    expect(spent.cells).toBeLessThanOrEqual(MOST_SPENT.cells + 200_000);
  });

  test('there are enough of them, and no two alike', () => {
    expect(new Set(HOSTILE_SHEETS.map(({ name }) => name)).size).toBe(HOSTILE_SHEETS.length);
    expect(HOSTILE_SHEETS.length).toBeGreaterThan(40);
  });
});
