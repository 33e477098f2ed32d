import { mkdirSync } from 'node:fs';
import { statfs } from 'node:fs/promises';
import { join } from 'node:path';
import { demandFree, rememberedPorts } from '../set-up/ports.mjs';
import { Problem } from '../set-up/problem.mjs';

const host = '127.0.0.1';
const leastSpace = 400_000_000;

/**
 * The storage folder, made, with room left on its disk.
 *
 * @param {string} home
 */
export async function openStorage(home) {
  mkdirSync(home, { recursive: true, mode: 0o755 });
  const disk = await statfs(home);
  const free = disk.bavail * disk.bsize;
  if (free < leastSpace) {
    throw new Problem(
      `The disk of ${home} is nearly full: ${Math.round(free / 1e6)} MB are left, ${leastSpace / 1e6} MB are needed.`,
      'Free some space, then run the command again.',
    );
  }
}

/**
 * Where the product of a storage folder serves, by the environment or by the ports chosen.
 *
 * @param {string} home
 * @param {NodeJS.ProcessEnv} env
 */
export async function chooseAddresses(home, env) {
  const ports = await rememberedPorts(join(home, 'ports.json'), [
    'site',
    'database',
    'objects',
    'smtp',
    'mailbox',
    'identity',
  ]);
  const port = env['PORT'] ? Number(env['PORT']) : ports.site;
  const publicUrl = env['PUBLIC_URL'] || `http://${host}:${port}`;
  return { ports, port, publicUrl };
}

/**
 * @param {object} options
 * @param {string} options.home
 * @param {number} options.port
 * @param {NodeJS.ProcessEnv} options.env
 */
export async function demandSitePort({ home, port, env }) {
  await demandFree(
    port,
    'the site',
    env['PORT']
      ? 'Stop that program, or set PORT to another one.'
      : `Stop that program, or remove ${join(home, 'ports.json')} to choose other ports.`,
  );
}
