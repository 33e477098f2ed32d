import { createHash } from 'node:crypto';
import { existsSync, readdirSync, readFileSync, statSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { readJson } from '../set-up/files.mjs';
import { Problem } from '../set-up/problem.mjs';
import { run, tail } from '../set-up/run.mjs';

const inputs = [
  'docs/record-format.md',
  'src',
  'public',
  'astro.config.mjs',
  'package.json',
  'package-lock.json',
  'tsconfig.json',
];
const stampName = '.built-from.json';

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
 * One hash over everything that a build is made from; the public address is part of it, for the
 * build holds the one host that it answers to.
 *
 * @param {string} root
 * @param {string} publicUrl
 */
export function hashOfSources(root, publicUrl) {
  const hash = createHash('sha256').update(`${process.version} ${publicUrl}\0`);
  for (const path of inputs.flatMap((input) => filesUnder(root, input))) {
    const content = readFileSync(join(root, path));
    hash.update(`${path}\0${content.length}\0`).update(content);
  }
  return hash.digest('hex');
}

/**
 * @param {string} folder
 * @returns {{ hash: string, publicUrl: string } | undefined} what a whole build there was made from
 */
export const buildIn = (folder) =>
  /** @type {{ hash: string, publicUrl: string } | undefined} */ (
    readJson(join(folder, stampName))
  );

/**
 * Builds the site into `folder` when its sources are not those of the last build there.
 *
 * @param {object} options
 * @param {string} options.root
 * @param {string} options.folder
 * @param {string} options.publicUrl
 * @param {NodeJS.ProcessEnv} options.env
 * @param {import('../set-up/progress.mjs').Progress} options.progress
 */
export async function ensureBuild({ root, folder, publicUrl, env, progress }) {
  const hash = hashOfSources(root, publicUrl);
  if (buildIn(folder)?.hash === hash) return;
  await progress.step('site built', async () => {
    const astro = join(root, 'node_modules/astro/astro.js');
    const built = await run(process.execPath, [astro, 'build', '--outDir', folder], {
      cwd: root,
      env: { ...env, PUBLIC_URL: publicUrl, NODE_ENV: 'production' },
    });
    if (built.code !== 0) {
      throw new Problem(
        `The site could not be built:\n${tail(built.output, 30)}`,
        'Mend what the lines above name; `npm run types` and `npm run lint` often say more.',
      );
    }
    writeFileSync(join(folder, stampName), JSON.stringify({ hash, publicUrl }));
  });
}
