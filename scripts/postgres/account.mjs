import { execFileSync } from 'node:child_process';
import { chownSync } from 'node:fs';
import { Problem } from '../set-up/problem.mjs';
import { run } from '../set-up/run.mjs';

/**
 * The unprivileged account that a database server runs under.
 *
 * @typedef {object} Account
 * @property {number} uid
 * @property {string} name
 * @property {(command: string, args: readonly string[]) => Promise<import('../set-up/run.mjs').RunResult>} run
 *   runs a command as this account, in the root folder, without the caller's environment
 * @property {(path: string) => void} own makes the account the owner of a file or folder
 * @property {(folder: string) => Promise<boolean>} canEnter
 */

const plainEnvironment = { PATH: '/usr/local/bin:/usr/bin:/bin', LANG: 'C.UTF-8' };

/** @param {string} name */
function idOf(name) {
  try {
    return Number(execFileSync('id', ['-u', name], { encoding: 'utf8', stdio: 'pipe' }).trim());
  } catch {
    throw new Problem(
      `PostgreSQL refuses to run as root, and there is no account "${name}" to run it as.`,
      'Install Debian’s package: apt-get install postgresql',
    );
  }
}

/**
 * The caller's own account or, for root, Debian's `postgres`.
 *
 * @returns {Account}
 */
export function serverAccount() {
  const own = process.getuid?.() ?? 0;
  const asRoot = own === 0;
  const uid = asRoot ? idOf('postgres') : own;
  const prefix = asRoot
    ? ['setpriv', '--reuid=postgres', '--regid=postgres', '--init-groups', '--reset-env', '--']
    : [];
  /** @type {Account['run']} */
  const runAs = (command, args) => {
    const [first = command, ...rest] = [...prefix, command, ...args];
    return run(first, rest, { cwd: '/', env: plainEnvironment, wholly: true });
  };
  return {
    uid,
    name: asRoot ? 'postgres' : String(own),
    run: runAs,
    own: (path) => {
      if (asRoot) chownSync(path, uid, Number(execFileSync('id', ['-g', 'postgres'])));
    },
    canEnter: async (folder) => (await runAs('test', ['-x', folder])).code === 0,
  };
}
