import { execFileSync } from 'node:child_process';
import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { basename, join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { afterAll, beforeAll, expect, test } from 'vitest';
import { MOST_BYTES } from '@/domain/paperwork/file/limits';
import { type HostileFile, hostileFiles } from '../../support/hostile/files';
import type { Inspected } from '../../support/inspect-hostile';

/** A process with the program's modules loaded has about 150 MB before it sees a file. */
const MOST_MEGABYTES = 700;

const root = fileURLToPath(new URL('../../..', import.meta.url));
let folder: string;
let corpus: readonly HostileFile[];
let inspected: readonly Inspected[];

beforeAll(async () => {
  folder = mkdtempSync(join(tmpdir(), 'tagwire-hostile-'));
  corpus = await hostileFiles();
  const jobs = corpus.map(({ name, purpose, bytes }) => {
    const file = join(folder, name);
    writeFileSync(file, bytes);
    return `${purpose}=${file}`;
  });
  // Another process, so that its memory is what the files took and not what made them.
  const told = execFileSync(
    join(root, 'node_modules/.bin/tsx'),
    ['tests/support/inspect-hostile.ts', ...jobs],
    { cwd: root, encoding: 'utf8' },
  );
  inspected = told
    .trim()
    .split('\n')
    .map((line) => JSON.parse(line) as Inspected);
  console.info(
    inspected
      .map(
        ({ file, milliseconds, peak }) =>
          `${basename(file)}: ${milliseconds} ms, peak so far ${peak} MB`,
      )
      .join('\n'),
  );
}, 300_000);
afterAll(() => rmSync(folder, { recursive: true, force: true }));

test('each hostile file is refused with words that say what it is and what to do', () => {
  const wrong = corpus.flatMap(({ name, says }, at) => {
    const words = inspected[at]?.words ?? 'nothing';
    const right = says === 'kept' ? words === 'kept' : says.test(words);
    return right ? [] : [`${name}: ${words}`];
  });
  expect(wrong).toEqual([]);
  expect(inspected.length).toBe(corpus.length);
});

test('every file of the corpus fits what may be sent, so that no other bound stops it first', () => {
  for (const { name, purpose, bytes } of corpus)
    expect(bytes.length, name).toBeLessThanOrEqual(MOST_BYTES[purpose]);
});

test('the whole corpus, one after the other, stays within the bound of memory', () => {
  const most = Math.max(...inspected.map(({ peak }) => peak));
  expect(most).toBeLessThan(MOST_MEGABYTES);
});
