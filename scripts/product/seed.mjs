import { rmSync } from 'node:fs';
import { join } from 'node:path';
import { databaseName } from '../postgres/cluster.mjs';
import { connect, createDatabase } from '../postgres/roles.mjs';
import { readJson, root } from '../set-up/files.mjs';
import { Problem } from '../set-up/problem.mjs';
import { run, tail } from '../set-up/run.mjs';
import { runMigrations } from './migrations.mjs';

const begun = 'demo data: begun';
const complete = 'demo data: complete';

/**
 * @param {import('../postgres/cluster.mjs').Cluster} cluster
 * @returns {Promise<string | null>} the mark that the database carries, which no table of ours is needed for
 */
async function markOf(cluster) {
  const client = await connect(cluster.superuserUrl);
  try {
    const found = await client.query(
      "select shobj_description(oid, 'pg_database') as mark from pg_database where datname = $1",
      [databaseName],
    );
    return found.rows[0]?.mark ?? null;
  } finally {
    await client.end();
  }
}

/**
 * @param {import('../postgres/cluster.mjs').Cluster} cluster
 * @param {(client: import('pg').Client) => Promise<unknown>} work
 */
async function asSuperuser(cluster, work) {
  const client = await connect(cluster.superuserUrl);
  try {
    await work(client);
  } finally {
    await client.end();
  }
}

/**
 * Fills an own, new database with the demo data, once. A seeding that broke off is begun again on
 * an empty database: nobody can have used the half of it, for the server starts afterwards.
 *
 * @param {object} options
 * @param {string} options.home
 * @param {import('../postgres/cluster.mjs').Cluster} options.cluster
 * @param {NodeJS.ProcessEnv} options.env
 * @param {import('../set-up/progress.mjs').Progress} options.progress
 */
export async function ensureSeed({ home, cluster, env, progress }) {
  const mark = await markOf(cluster);
  if (mark === complete) return;
  await progress.step('demo data written', async () => {
    if (mark === begun) {
      await asSuperuser(cluster, async (client) => {
        await client.query(`drop database "${databaseName}" with (force)`);
        await createDatabase(client, databaseName);
      });
      rmSync(join(home, 'people.json'), { force: true });
      // Heads signed for the dropped half would close the record of the next attempt.
      rmSync(join(home, 'ledger-heads'), { recursive: true, force: true });
      await runMigrations(cluster.ownerUrl, env);
    }
    await asSuperuser(cluster, (client) =>
      client.query(`comment on database "${databaseName}" is '${begun}'`),
    );
    const done = await run(
      process.execPath,
      ['--import', 'tsx', join(root, 'scripts/seed.ts'), join(home, 'people.json')],
      { cwd: root, env },
    );
    if (done.code !== 0) {
      throw new Problem(
        `The demo data could not be written:\n${tail(done.output, 25)}`,
        'Run the command again: it begins anew with an empty database.',
      );
    }
    await asSuperuser(cluster, (client) =>
      client.query(`comment on database "${databaseName}" is '${complete}'`),
    );
  });
}

/**
 * @param {string} home
 * @returns {import('../local/identity.mjs').Person[]} whom one can sign in as
 */
export function demoPeople(home) {
  const stored = /** @type {{ people: import('../local/identity.mjs').Person[] } | undefined} */ (
    readJson(join(home, 'people.json'))
  );
  return stored?.people ?? [];
}
