import { chmodSync, existsSync, lstatSync, mkdirSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { sha256 } from '../set-up/files.mjs';
import { postgresPrograms } from '../set-up/packages.mjs';
import { Problem } from '../set-up/problem.mjs';

/** @param {string} path */
function ownerOf(path) {
  const found = lstatSync(path, { throwIfNoEntry: false });
  if (found === undefined) return undefined;
  if (found.isSymbolicLink() || !found.isDirectory()) {
    throw new Problem(`${path} is not a folder.`, 'Move it away, then start again.');
  }
  return found.uid;
}

/**
 * Where the data goes: inside `home`, or outside when the server's account cannot reach that.
 *
 * @param {string} home
 * @param {import('./account.mjs').Account} account
 * @returns {Promise<{ parent: string, elsewhere: boolean }>}
 */
export async function placeFor(home, account) {
  const outside = join('/var/tmp', `tagwire-${sha256(home).slice(0, 16)}`);
  const reachable = await account.canEnter(home);
  if (reachable) return { parent: home, elsewhere: false };
  if (existsSync(join(home, 'postgres'))) {
    throw new Problem(
      `The database under ${home} can no longer be reached by the account ${account.name}: a parent folder is closed to it.`,
      `Open the parents for passing through (chmod o+x), or move ${join(home, 'postgres')} to ${outside}.`,
    );
  }
  const uid = ownerOf(outside);
  if (uid === undefined) {
    mkdirSync(outside, { mode: 0o700 });
    account.own(outside);
  } else if (uid !== account.uid) {
    throw new Problem(
      `${outside} belongs to another account.`,
      'Remove it, or move the checkout to a folder whose parents can be passed through.',
    );
  }
  chmodSync(outside, 0o700);
  return { parent: outside, elsewhere: true };
}

/**
 * @param {string} folder
 * @param {import('./account.mjs').Account} account
 * @returns {string} the folder of the programs that fit the data
 */
export function programsFor(folder, account) {
  const all = postgresPrograms();
  const newest = all[0];
  if (newest === undefined) {
    throw new Problem('PostgreSQL is missing.', 'As root: apt-get install postgresql');
  }
  const uid = ownerOf(folder);
  if (uid === undefined) return newest.folder;
  if (uid !== account.uid) {
    throw new Problem(
      `The database in ${folder} was made under another account (number ${uid}).`,
      'Start as the account that made it, or move that folder away to begin with an empty one.',
    );
  }
  const version = Number(readFileSync(join(folder, 'PG_VERSION'), 'utf8').trim());
  const fitting = all.find((programs) => programs.version === version);
  if (fitting !== undefined) return fitting.folder;
  throw new Problem(
    `The database in ${folder} was made by PostgreSQL ${version}, which is not installed.`,
    `As root: apt-get install postgresql-${version}`,
  );
}
