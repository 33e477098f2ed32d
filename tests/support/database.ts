import { randomBytes } from 'node:crypto';
import { inject } from 'vitest';
import { connect, createDatabase, withDatabase } from '../../scripts/postgres/roles.mjs';

export interface TestDatabase {
  /** The migrating role: owns every table. */
  readonly ownerUrl: string;
  /** The application's role: what the product connects as. */
  readonly appUrl: string;
  /** Passes every privilege; for arranging what nobody else may, and for looking. */
  readonly superuserUrl: string;
  readonly drop: () => Promise<void>;
}

/** A migrated, empty database of the test file's own; call `drop` in `afterAll`. */
export async function createTestDatabase(): Promise<TestDatabase> {
  const cluster = inject('cluster');
  const name = `test_${randomBytes(6).toString('hex')}`;
  const superuser = await connect(cluster.superuserUrl);
  try {
    await createDatabase(superuser, name, cluster.template);
  } finally {
    await superuser.end();
  }
  return {
    ownerUrl: withDatabase(cluster.ownerUrl, name),
    appUrl: withDatabase(cluster.appUrl, name),
    superuserUrl: withDatabase(cluster.superuserUrl, name),
    drop: async () => {
      const client = await connect(cluster.superuserUrl);
      await client.query(`drop database "${name}" with (force)`);
      await client.end();
    },
  };
}
