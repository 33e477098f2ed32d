import { existsSync, readFileSync, writeFileSync } from 'node:fs';
import { dirname, join } from 'node:path';
import { readJson, sha256 } from './files.mjs';
import { Problem } from './problem.mjs';
import { run, tail } from './run.mjs';

const stampName = 'node_modules/.tagwire-installed';

/** @typedef {{ version?: string, optional?: boolean, link?: boolean }} LockedPackage */

/**
 * Whether every package that the lock file names is installed in that version.
 *
 * @param {string} root
 * @param {string} lockText
 */
export function isInstalled(root, lockText) {
  /** @type {{ packages: Record<string, LockedPackage> }} */
  const lock = JSON.parse(lockText);
  return Object.entries(lock.packages).every(([path, wanted]) => {
    if (path === '' || wanted.optional === true || wanted.link === true) return true;
    const manifest = /** @type {{ version?: string } | undefined} */ (
      readJson(join(root, path, 'package.json'))
    );
    return manifest?.version === wanted.version;
  });
}

/** The npm that belongs to this Node, else the first one found. */
function npmCommand() {
  const beside = join(dirname(process.execPath), '../lib/node_modules/npm/bin/npm-cli.js');
  const script = process.env['npm_execpath'] ?? (existsSync(beside) ? beside : undefined);
  return script?.endsWith('.js')
    ? { command: process.execPath, first: [script] }
    : { command: 'npm', first: [] };
}

/**
 * Installs the packages of the lock file where they are missing or others.
 *
 * @param {string} root
 * @param {import('./progress.mjs').Progress} progress
 */
export async function ensureDependencies(root, progress) {
  const lockText = readFileSync(join(root, 'package-lock.json'), 'utf8');
  const hash = sha256(lockText);
  const stamp = join(root, stampName);
  if (existsSync(stamp) && readFileSync(stamp, 'utf8') === hash) return;
  if (!isInstalled(root, lockText)) {
    await progress.step('packages of the lock file installed', () => install(root));
  }
  writeFileSync(stamp, hash);
}

/** @param {string} root */
async function install(root) {
  const { command, first } = npmCommand();
  const result = await run(command, [...first, 'ci', '--include=dev', '--no-audit', '--no-fund'], {
    cwd: root,
  });
  if (result.code === 0) return;
  const said = tail(result.output);
  if (/ENOSPC|no space left/i.test(said)) {
    throw new Problem(
      'The disk is full: the packages could not be installed.',
      'Free about 1 GB, then run again.',
    );
  }
  if (/EACCES|EPERM/.test(said)) {
    throw new Problem(
      `This account may not write node_modules:\n${said}`,
      'Run as the account that owns the checkout, or remove node_modules first.',
    );
  }
  if (result.code === 127) {
    throw new Problem(
      'npm was not found.',
      'Install Node.js 20 with its npm, and have both on the PATH.',
    );
  }
  throw new Problem(
    `The packages could not be installed:\n${said}`,
    'The first installation needs the network and a registry that npm can reach; see `npm config get registry`.',
  );
}
