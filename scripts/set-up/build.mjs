import { createHash } from 'node:crypto';
import { existsSync, readdirSync, readFileSync, statSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { Problem } from './problem.mjs';
import { run, tail } from './run.mjs';

const inputs = [
  'src',
  'public',
  'astro.config.mjs',
  'package.json',
  'package-lock.json',
  'tsconfig.json',
];
const stampName = 'dist/.built-from';

/**
 * @param {string} folder
 * @param {string} path below it
 * @returns {string[]} every file there, sorted
 */
function filesUnder(folder, path) {
  const full = join(folder, path);
  if (!existsSync(full)) return [];
  if (!statSync(full).isDirectory()) return [path];
  return readdirSync(full)
    .sort()
    .flatMap((name) => filesUnder(folder, join(path, name)));
}

/**
 * One hash over everything that a build is made from.
 *
 * @param {string} root
 */
export function hashOfSources(root) {
  const hash = createHash('sha256').update(process.version);
  for (const path of inputs.flatMap((input) => filesUnder(root, input))) {
    const content = readFileSync(join(root, path));
    hash.update(`${path}\0${content.length}\0`).update(content);
  }
  return hash.digest('hex');
}

/** @param {string} root */
export function isBuilt(root) {
  const stamp = join(root, stampName);
  return existsSync(stamp) && readFileSync(stamp, 'utf8') === hashOfSources(root);
}

/**
 * Builds the site when its sources are not those of the last build.
 *
 * @param {string} root
 * @param {NodeJS.ProcessEnv} env
 * @param {import('./progress.mjs').Progress} progress
 */
export async function ensureBuild(root, env, progress) {
  if (isBuilt(root)) return;
  await progress.step('site built', async () => {
    const from = hashOfSources(root);
    const built = await run(
      process.execPath,
      [join(root, 'node_modules/astro/astro.js'), 'build'],
      {
        cwd: root,
        env: { ...env, NODE_ENV: 'production', ASTRO_TELEMETRY_DISABLED: '1' },
      },
    );
    if (built.code !== 0) {
      throw new Problem(
        `The site could not be built:\n${tail(built.output, 30)}`,
        'Mend what the lines above name; `npm run types` and `npm run lint` often say more.',
      );
    }
    writeFileSync(join(root, stampName), from);
  });
}
