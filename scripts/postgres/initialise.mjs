import { appendFileSync, mkdirSync, renameSync, rmSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { Problem } from '../set-up/problem.mjs';
import { tail } from '../set-up/run.mjs';

/**
 * Makes the data folder, whole or not at all.
 *
 * @param {object} place
 * @param {string} place.bin
 * @param {string} place.folder
 * @param {import('./account.mjs').Account} place.account
 * @param {string} place.password
 */
export async function initialise({ bin, folder, account, password }) {
  const draft = `${folder}.new`;
  const passwordFile = `${folder}.password`;
  rmSync(draft, { recursive: true, force: true });
  rmSync(passwordFile, { force: true });
  mkdirSync(draft, { mode: 0o700 });
  account.own(draft);
  writeFileSync(passwordFile, `${password}\n`, { mode: 0o600, flag: 'wx' });
  account.own(passwordFile);
  try {
    const made = await account.run(join(bin, 'initdb'), [
      `--pgdata=${draft}`,
      '--username=tagwire_superuser',
      `--pwfile=${passwordFile}`,
      '--auth=scram-sha-256',
      '--encoding=UTF8',
      '--locale=C.UTF-8',
    ]);
    if (made.code !== 0) {
      const full = /no space left on device/i.test(made.output);
      throw new Problem(
        `${full ? 'The disk is full: the' : 'The'} database could not be set up:\n${tail(made.output)}`,
        full ? 'Free some space, then run the command again.' : 'Mend what the lines above name.',
      );
    }
  } finally {
    rmSync(passwordFile, { force: true });
  }
  const settings = [
    "listen_addresses = '127.0.0.1'",
    "unix_socket_directories = ''",
    "timezone = 'UTC'",
    "log_timezone = 'UTC'",
    'synchronous_commit = on',
    'password_encryption = scram-sha-256',
  ];
  appendFileSync(join(draft, 'postgresql.conf'), `\n${settings.join('\n')}\n`);
  renameSync(draft, folder);
}
