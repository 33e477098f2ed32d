import { join } from 'node:path';
import { postgresPrograms } from '../set-up/packages.mjs';
import { run } from '../set-up/run.mjs';

/** Runs pg_dump or pg_restore against an address, whose password is not shown in the list of processes. */
export const postgresTool = async (
  name: 'pg_dump' | 'pg_restore',
  url: string,
  args: readonly string[],
): Promise<void> => {
  const [newest] = postgresPrograms();
  const { hostname, port, username, password, pathname } = new URL(url);
  const done = await run(newest === undefined ? name : join(newest.folder, name), args, {
    wholly: true,
    env: {
      ...process.env,
      PGHOST: hostname,
      PGPORT: port === '' ? '5432' : port,
      PGUSER: decodeURIComponent(username),
      PGPASSWORD: decodeURIComponent(password),
      PGDATABASE: pathname.slice(1),
    },
  });
  if (done.code !== 0) throw new Error(`${name} failed:\n${done.output.slice(-4000)}`);
};
