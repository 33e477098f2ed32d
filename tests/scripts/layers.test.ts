import { spawnSync } from 'node:child_process';
import { cpSync, mkdirSync, mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { dirname, join, resolve } from 'node:path';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';

/** Each a file that breaks the house's table of imports (DEVELOPERS.md), and the rule that must say so. */
const PLANTED: readonly (readonly [file: string, source: string, rule: string])[] = [
  ['src/domain/a.ts', "export { readFile } from 'node:fs';", 'noRestrictedImports'],
  [
    'src/domain/b.ts',
    "export { EntityManager } from '@mikro-orm/postgresql';",
    'noRestrictedImports',
  ],
  ['src/domain/c.ts', "export { composition } from '@/composition';", 'noRestrictedImports'],
  [
    'src/domain/d.ts',
    "export { edition } from '@/contracts/rulebook/edition';",
    'noRestrictedImports',
  ],
  ['src/domain/deep/er/e.ts', "export { a } from '../../../services/a';", 'noRestrictedImports'],
  ['src/domain/f.ts', 'export const at = () => Date.now();', 'plugin'],
  ['src/domain/g.ts', 'export const chance = () => Math.random();', 'plugin'],
  ['src/domain/h.ts', 'export const now = () => new Date();', 'plugin'],
  ['src/domain/i.ts', 'export const home = process.env.HOME;', 'noRestrictedGlobals'],
  ['src/domain/j.ts', "export const page = () => fetch('/');", 'noRestrictedGlobals'],
  [
    'src/contracts/a.ts',
    "export { invitePerson } from '@/services/people/invite-person';",
    'noRestrictedImports',
  ],
  [
    'src/entities/a.ts',
    "export { openDatabase } from '@/adapters/database/orm';",
    'noRestrictedImports',
  ],
  [
    'src/services/a.ts',
    "export { openDatabase } from '@/adapters/database/orm';",
    'noRestrictedImports',
  ],
  ['src/services/b.ts', "export { problem } from '@/http/problem';", 'noRestrictedImports'],
  ['src/services/c.ts', "export { default } from 'sharp';", 'noRestrictedImports'],
  ['src/adapters/a.ts', "export { composition } from '@/composition';", 'noRestrictedImports'],
  ['src/pages/a.ts', "export { Person } from '@/entities/people/person';", 'noRestrictedImports'],
  [
    'src/pages/b.ts',
    "export { openDatabase } from '@/adapters/database/orm';",
    'noRestrictedImports',
  ],
  [
    'src/components/a.tsx',
    "export { invitePerson } from '@/services/people/invite-person';",
    'noRestrictedImports',
  ],
  ['src/components/b.tsx', "export { readFile } from 'node:fs';", 'noRestrictedImports'],
  [
    'src/domain/one.ts',
    "import { two } from './two';\nexport const one = () => two;",
    'noImportCycles',
  ],
  [
    'src/domain/two.ts',
    "import { one } from './one';\nexport const two = () => one;",
    'noImportCycles',
  ],
];

interface Diagnostic {
  readonly category: string | null;
  readonly location: { readonly path: string | { readonly file: string } | null };
}

describe('the house keeps its rooms apart', () => {
  const root = resolve(import.meta.dirname, '../..');
  let copy: string;
  let diagnostics: readonly Diagnostic[];

  beforeAll(() => {
    copy = mkdtempSync(join(tmpdir(), 'tagwire-layers-'));
    cpSync(join(root, 'biome.json'), join(copy, 'biome.json'));
    cpSync(join(root, 'scripts/lint'), join(copy, 'scripts/lint'), { recursive: true });
    for (const [file, source] of PLANTED) {
      mkdirSync(join(copy, dirname(file)), { recursive: true });
      writeFileSync(join(copy, file), `${source}\n`);
    }
    const biome = join(root, 'node_modules/@biomejs/biome/bin/biome');
    const run = spawnSync(
      process.execPath,
      [biome, 'lint', '--reporter=json', '--max-diagnostics=none', '.'],
      { cwd: copy, encoding: 'utf8' },
    );
    const start = run.stdout.indexOf('{');
    diagnostics = (JSON.parse(run.stdout.slice(start)) as { diagnostics: Diagnostic[] })
      .diagnostics;
  }, 60_000);

  afterAll(() => rmSync(copy, { recursive: true, force: true }));

  it.each(PLANTED)('%s: %s', (file, _source, rule) => {
    const found = diagnostics
      .filter(({ location }) => {
        const path = typeof location.path === 'string' ? location.path : location.path?.file;
        return path?.endsWith(file) === true;
      })
      .map(({ category }) => category);
    expect(found.some((category) => category?.includes(rule))).toBe(true);
  });
});
