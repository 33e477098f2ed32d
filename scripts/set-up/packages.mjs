import { existsSync, mkdirSync, readdirSync, readFileSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { Problem } from './problem.mjs';
import { run, tail } from './run.mjs';

const oldestPostgres = 15;
const postgresHome = '/usr/lib/postgresql';
const clusterDefaults = '/etc/postgresql-common/createcluster.conf';
const chromium = '/usr/bin/chromium';
const office = '/usr/bin/soffice';

const aptEnvironment = () => ({
  ...process.env,
  DEBIAN_FRONTEND: 'noninteractive',
  UCF_FORCE_CONFFOLD: '1',
  TMPDIR: '/tmp',
});

/**
 * Installs one of Debian's packages.
 *
 * @param {string} name
 * @param {string} what what it is needed for, for the message
 */
async function install(name, what) {
  if (process.getuid?.() !== 0 || !existsSync('/usr/bin/apt-get')) {
    throw new Problem(
      `${what} is missing, and only root can install it.`,
      `Run once as root: apt-get update && apt-get install --no-install-recommends ${name}`,
    );
  }
  const lock = ['-o', 'DPkg::Lock::Timeout=300'];
  const env = aptEnvironment();
  const update = await run('apt-get', ['update', '-q', ...lock], { env });
  const installed = await run(
    'apt-get',
    [
      'install',
      '-y',
      '-q',
      '--no-install-recommends',
      '-o',
      'Dpkg::Options::=--force-confold',
      ...lock,
      name,
    ],
    { env },
  );
  if (installed.code === 0) return;
  throw new Problem(
    `Debian's package ${name} (${what}) could not be installed:\n${tail(update.output, 4)}\n${tail(installed.output)}`,
    `Look at the lines above; then, as root: apt-get update && apt-get install ${name}`,
  );
}

/**
 * @param {string} [home]
 * @returns {{ version: number, folder: string }[]} the complete sets of PostgreSQL programs, newest first
 */
export function postgresPrograms(home = postgresHome) {
  if (!existsSync(home)) return [];
  return readdirSync(home)
    .map((name) => ({ version: Number(name), folder: join(home, name, 'bin') }))
    .filter(
      ({ version, folder }) => version >= oldestPostgres && existsSync(join(folder, 'initdb')),
    )
    .sort((a, b) => b.version - a.version);
}

/** Debian makes and starts a cluster of its own when the package comes in; this one shall not. */
function forbidSystemCluster() {
  const line = 'create_main_cluster = false';
  mkdirSync('/etc/postgresql-common', { recursive: true });
  const present = existsSync(clusterDefaults) ? readFileSync(clusterDefaults, 'utf8') : '';
  if (/^\s*create_main_cluster\s*=\s*(false|off|no)/m.test(present)) return;
  writeFileSync(
    clusterDefaults,
    `${present}${present === '' || present.endsWith('\n') ? '' : '\n'}${line}\n`,
  );
}

/** Installs PostgreSQL when no usable version is there. */
export async function ensurePostgres() {
  if (postgresPrograms().length > 0) return;
  if (process.getuid?.() === 0) forbidSystemCluster();
  await install('postgresql', 'PostgreSQL 15 or newer');
  if (postgresPrograms().length > 0) return;
  throw new Problem(
    `The package came in, but no PostgreSQL ${oldestPostgres} or newer stands under ${postgresHome}.`,
    'Use a system whose postgresql package is version 15 or newer (Debian 12 is).',
  );
}

/**
 * Installs Chromium when it is missing.
 *
 * @returns {Promise<string>} its path
 */
export async function ensureChromium() {
  const chosen = process.env['CHROMIUM_PATH'];
  if (chosen !== undefined && chosen !== '') return chosen;
  if (!existsSync(chromium)) await install('chromium', 'Chromium, for the browser tests,');
  return chromium;
}

/**
 * Installs LibreOffice Calc when it is missing; that takes minutes, so it is said.
 *
 * @param {(line: string) => void} say
 * @returns {Promise<string>} its path
 */
export async function ensureOffice(say) {
  const chosen = process.env['OFFICE_PATH'];
  if (chosen !== undefined && chosen !== '') return chosen;
  if (existsSync(office)) return office;
  say('  LibreOffice Calc is missing: it is installed now (some 500 MB).');
  await install('libreoffice-calc', 'LibreOffice Calc, which makes the sheets,');
  return office;
}
