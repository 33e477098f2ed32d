import { join } from 'node:path';
import { root } from '../set-up/files.mjs';
import { Problem } from '../set-up/problem.mjs';
import { run, tail } from '../set-up/run.mjs';

/**
 * Brings a database of our own up to date, in a process of its own.
 *
 * @param {string} ownerUrl
 * @param {NodeJS.ProcessEnv} env
 */
export async function runMigrations(ownerUrl, env) {
  const done = await run(process.execPath, [join(root, 'scripts/migrate.mjs')], {
    cwd: root,
    env: { ...env, MIGRATION_DATABASE_URL: ownerUrl },
    wholly: true,
  });
  if (done.code === 0) return;
  throw new Problem(
    `The database could not be brought up to date:\n${tail(done.output, 25)}`,
    'Nothing was changed: all changes are one transaction. Mend what the lines above name.',
  );
}
