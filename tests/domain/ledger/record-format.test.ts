import { spawnSync } from 'node:child_process';
import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, describe, expect, it } from 'vitest';
import { LINE_KINDS } from '@/domain/ledger/line-kind';
import { exampleBlocks } from './example-blocks';
import { blocksOf, page } from './record-format';

describe('docs/record-format.md', () => {
  it('shows exactly the values the code makes', async () => {
    const made = await exampleBlocks();
    const shown = blocksOf('example');
    expect([...shown.keys()]).toEqual(expect.arrayContaining([...made.keys()]));
    expect(shown.size).toBe(made.size);
    for (const [name, value] of made) expect(shown.get(name), name).toBe(value);
  });

  it('lists every kind of line', () => {
    for (const kind of LINE_KINDS) expect(page).toContain(`\`${kind}\``);
  });
});

describe('the page’s own script for draws', () => {
  const folder = mkdtempSync(join(tmpdir(), 'tagwire-draw-'));
  afterAll(() => rmSync(folder, { recursive: true }));
  const shown = blocksOf('example');
  const write = (name: string, content: string): string => {
    const path = join(folder, name);
    writeFileSync(path, content);
    return path;
  };
  const script = write('draw.mjs', blocksOf('js').get('draw.mjs') ?? '');
  const commitment = shown.get('draw-commitment') ?? '';
  const made = shown.get('draw-made') ?? '';
  const run = (announced: string, result: string) =>
    spawnSync(
      process.execPath,
      [script, write('commitment.json', announced), write('made.json', result)],
      { encoding: 'utf8' },
    );

  it('draws the same cars', () => {
    const { stdout, stderr, status } = run(commitment, made);
    expect(stderr).toBe('');
    expect(stdout).toMatch(/^same: /);
    expect(status).toBe(0);
    const cars = (JSON.parse(made) as { selected: { car: string }[] }).selected;
    expect(stdout.trim()).toBe(`same: ${cars.map(({ car }) => car).join(', ')}`);
  });

  it.each([
    ['a value', commitment, made.replace('"14"', '"15"')],
    ['the secret', commitment, made.replace(/"secret":"../, '"secret":"zz')],
    ['the pool', commitment.replace('"12J"', '"12"'), made],
  ])('says so when %s was changed', (_, announced, result) => {
    expect(announced + result).not.toBe(commitment + made);
    const { stdout, status } = run(announced, result);
    expect(stdout).toMatch(/^DIFFERENT/);
    expect(status).toBe(1);
  });
});
