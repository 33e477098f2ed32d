import { existsSync } from 'node:fs';
import { join } from 'node:path';
import { databaseName, startCluster } from '../postgres/cluster.mjs';
import { withDatabase } from '../postgres/roles.mjs';
import { root, writePrivately } from '../set-up/files.mjs';
import { ensurePostgres, postgresPrograms } from '../set-up/packages.mjs';
import { ensureBuild } from './build.mjs';
import { ensureLedgerKey, variables, wantedStandIns } from './environment.mjs';
import { chooseAddresses, demandSitePort } from './home.mjs';
import { runMigrations } from './migrations.mjs';
import { demoPeople, ensureSeed } from './seed.mjs';
import { startService, untilAnswering } from './services.mjs';
import { startStandIns } from './stand-ins.mjs';

const host = '127.0.0.1';

/** @typedef {import('../set-up/progress.mjs').Progress} Progress */
/** @typedef {import('../postgres/cluster.mjs').Cluster} Cluster */
/** @typedef {import('./stack.mjs').Stack} Stack */

/**
 * @typedef {object} Product
 * @property {string} publicUrl
 * @property {string | undefined} mailboxUrl
 * @property {Cluster | undefined} cluster
 * @property {NodeJS.ProcessEnv} env what the server was started with
 * @property {import('./services.mjs').Service} server
 */

/**
 * Starts everything up to the answering server. What was started is on the stack even on failure.
 *
 * @param {object} options
 * @param {string} options.home storage folder, already open
 * @param {NodeJS.ProcessEnv} options.env the caller's, whose set variables win over the stand-ins
 * @param {'serve' | 'dev'} options.mode
 * @param {string} options.buildFolder
 * @param {Stack} options.stack
 * @param {Progress} options.progress
 * @param {AbortSignal} options.signal
 * @returns {Promise<Product>}
 */
export async function startProduct({ home, env, mode, buildFolder, stack, progress, signal }) {
  const addresses = await chooseAddresses(home, env);
  const { ports, port, publicUrl } = addresses;
  await demandSitePort({ home, port, env });
  const wanted = wantedStandIns(env);
  const quiet = {
    ...env,
    ASTRO_TELEMETRY_DISABLED: '1',
    ASTRO_DISABLE_UPDATE_CHECK: 'true',
    TZ: 'UTC',
  };

  const prepare = async () => {
    const cluster = wanted.database
      ? await ownCluster({ home, port: ports.database, stack, progress })
      : undefined;
    signal.throwIfAborted();
    const standIns = await progress.step('local stand-ins started', () =>
      startStandIns({ home, publicUrl, ports, wanted, env: quiet }),
    );
    const { service } = standIns;
    if (service !== undefined) stack.push(() => service.stop());
    signal.throwIfAborted();
    /** @type {NodeJS.ProcessEnv} */
    const configured = {
      MAIL_FROM: `Tagwire <tagwire@localhost>`,
      LEDGER_KEY_FILE: env['LEDGER_KEY_FILE'] || ensureLedgerKey(home),
      ...standIns.env,
      ...quiet,
      ...(cluster === undefined ? {} : { DATABASE_URL: cluster.appUrl }),
      PUBLIC_URL: publicUrl,
      HOST: env['HOST'] || host,
      PORT: String(port),
      STORAGE_DIR: home,
      NODE_ENV: mode === 'dev' ? 'development' : 'production',
    };
    // The server never learns the migrating role's address.
    delete configured['MIGRATION_DATABASE_URL'];
    if (cluster !== undefined) {
      await progress.step('database brought up to date', () =>
        runMigrations(cluster.ownerUrl, quiet),
      );
      signal.throwIfAborted();
      await ensureSeed({ home, cluster, env: configured, progress });
    }
    return { cluster, configured, mailboxUrl: standIns.mailboxUrl };
  };
  const build = async () => {
    if (mode === 'serve') {
      await ensureBuild({ root, folder: buildFolder, publicUrl, env: quiet, progress });
    }
  };
  const [prepared, built] = await Promise.allSettled([prepare(), build()]);
  if (prepared.status === 'rejected') throw prepared.reason;
  if (built.status === 'rejected') throw built.reason;
  signal.throwIfAborted();

  const { cluster, configured, mailboxUrl } = prepared.value;
  const log = join(home, 'logs/server.log');
  const server = await progress.step('server started', async () => {
    const service = startService({
      name: 'server',
      args: serverArguments(mode, buildFolder, port),
      env: configured,
      log,
    });
    stack.push(() => service.stop());
    const local = `http://${configured['HOST'] === '0.0.0.0' ? host : configured['HOST']}:${port}`;
    await untilAnswering({ service, url: mode === 'dev' ? local : `${local}/healthz`, log });
    return service;
  });
  writePrivately(
    join(home, 'product.json'),
    `${JSON.stringify(wordOf({ home, publicUrl, mailboxUrl, cluster, env: configured }), null, 2)}\n`,
  );
  return { publicUrl, mailboxUrl, cluster, env: configured, server };
}

/**
 * What the browser tests need to know of a started product.
 *
 * @param {Pick<Product, 'publicUrl' | 'mailboxUrl' | 'cluster' | 'env'> & { home: string }} product
 */
function wordOf({ home, publicUrl, mailboxUrl, cluster, env }) {
  return {
    home,
    publicUrl,
    mailboxUrl,
    superuserUrl:
      cluster === undefined ? undefined : withDatabase(cluster.superuserUrl, databaseName),
    ownerUrl: cluster?.ownerUrl,
    appUrl: cluster?.appUrl,
    people: demoPeople(home),
    env: Object.fromEntries(variables.map((name) => [name, env[name]])),
  };
}

/**
 * @param {'serve' | 'dev'} mode
 * @param {string} buildFolder
 * @param {number} port
 */
const serverArguments = (mode, buildFolder, port) =>
  mode === 'dev'
    ? [join(root, 'node_modules/astro/astro.js'), 'dev', '--host', host, '--port', String(port)]
    : [join(buildFolder, 'server/server.mjs')];

/**
 * @param {object} options
 * @param {string} options.home
 * @param {number} options.port
 * @param {Stack} options.stack
 * @param {Progress} options.progress
 */
export async function ownCluster({ home, port, stack, progress }) {
  if (postgresPrograms().length === 0) {
    await progress.step('PostgreSQL installed', () => ensurePostgres());
  }
  const made = existsSync(join(home, 'database.json'));
  const cluster = await progress.step(made ? 'database started' : 'database made and started', () =>
    startCluster({ home, port }),
  );
  stack.push(() => cluster.stop());
  if (cluster.elsewhere !== undefined) {
    progress.say(
      `  note The database account cannot pass the parents of this folder, so its data is in ${cluster.elsewhere}`,
    );
  }
  return cluster;
}
