import { Migrator } from '@mikro-orm/migrations';
import { defineConfig, MikroORM } from '@mikro-orm/postgresql';
import PgBoss from 'pg-boss';
import { migrationsList } from '../../../migrations/index';
import { APP_ROLE_SETTING } from '../../../migrations/sql';
import { QUEUES } from './queues';

const MIGRATION_LOCK = 7_246_913;

const SCHEMA_CHANGE = `
create table if not exists record.schema_change (
  id serial primary key,
  name varchar(255),
  executed_at timestamptz default current_timestamp
)`;

/**
 * Brings the database at `ownerUrl` up to date: schema changes, then the job queues. Safe to run
 * from several processes at once.
 *
 * @param input.ownerUrl URL of the role that owns the schemas
 * @param input.appRole  the application's role, which must exist (default `tagwire_app`)
 * @returns names of the changes applied now, oldest first
 */
export const migrate = async (input: {
  readonly ownerUrl: string;
  readonly appRole?: string;
}): Promise<string[]> => {
  const appRole = input.appRole ?? 'tagwire_app';
  const orm = await MikroORM.init(
    defineConfig({
      clientUrl: input.ownerUrl,
      entities: [],
      discovery: { warnWhenNoEntities: false },
      metadataCache: { enabled: false },
      forceUtcTimezone: true,
      pool: { min: 0, max: 2 },
      extensions: [Migrator],
      migrations: {
        migrationsList,
        tableName: 'record.schema_change',
        transactional: true,
        allOrNothing: true,
        snapshot: false,
        silent: true,
      },
    }),
  );
  try {
    // The migrator looks for its table on a connection of its own, so the schema is committed first.
    await orm.em.fork().transactional(async (em) => {
      await em.execute('select pg_advisory_xact_lock(?)', [MIGRATION_LOCK]);
      await em.execute('create schema if not exists record');
      await em.execute(SCHEMA_CHANGE);
    });
    const applied = await orm.em.fork().transactional(async (em) => {
      await em.execute('select pg_advisory_xact_lock(?)', [MIGRATION_LOCK]);
      await em.execute('select set_config(?, ?, true)', [APP_ROLE_SETTING, appRole]);
      const transaction = em.getTransactionContext();
      const done = await orm.getMigrator().up(transaction ? { transaction } : {});
      return done.map((change) => change.name);
    });
    await prepareQueues(input.ownerUrl, appRole, orm);
    return applied;
  } finally {
    await orm.close();
  }
};

const prepareQueues = async (ownerUrl: string, appRole: string, orm: MikroORM): Promise<void> => {
  const boss = new PgBoss({
    connectionString: ownerUrl,
    schema: 'jobs',
    max: 2,
    supervise: false,
    schedule: false,
  });
  boss.on('error', () => undefined);
  await boss.start();
  try {
    for (const queue of QUEUES) await boss.createQueue(queue);
  } finally {
    await boss.stop({ graceful: false, wait: true });
  }
  // Tables that a queue brings along are made by a function of the library, so the grant is said
  // once more for all.
  await orm.em
    .fork()
    .execute(
      `do $do$ begin execute format('grant select, insert, update, delete on all tables in schema jobs to %I', '${appRole.replaceAll("'", "''")}'); end $do$`,
    );
};
