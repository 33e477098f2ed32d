import { accessSync, chmodSync, constants, mkdtempSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { serverAccount } from '../postgres/account.mjs';
import { Problem } from './problem.mjs';

/** @param {string} folder */
function isWritable(folder) {
  try {
    accessSync(folder, constants.W_OK | constants.X_OK);
    return true;
  } catch {
    return false;
  }
}

/** @returns {string} `TMPDIR` where that is usable, else `/tmp` or `/var/tmp` */
export function usableTemporaryFolder() {
  const found = [tmpdir(), '/tmp', '/var/tmp'].find(
    (folder) => folder.startsWith('/') && isWritable(folder),
  );
  if (found !== undefined) return found;
  throw new Problem(
    'Neither TMPDIR nor /tmp nor /var/tmp can be used for temporary files.',
    'Set TMPDIR to a folder that this account can write.',
  );
}

/**
 * A new temporary folder that the database's account can pass through. `TMPDIR` is used where it
 * exists, is writable and is open to that account; else `/tmp` or `/var/tmp`.
 *
 * @param {string} name the beginning of its name
 * @returns {Promise<string>}
 */
export async function newTemporaryFolder(name) {
  const account = serverAccount();
  for (const parent of [tmpdir(), '/tmp', '/var/tmp']) {
    if (!parent.startsWith('/') || !isWritable(parent) || !(await account.canEnter(parent)))
      continue;
    const folder = mkdtempSync(join(parent, name));
    chmodSync(folder, 0o711);
    return folder;
  }
  throw new Problem(
    'Neither TMPDIR nor /tmp nor /var/tmp can be used for temporary files.',
    'Set TMPDIR to a folder that this account can write and others can pass through.',
  );
}
