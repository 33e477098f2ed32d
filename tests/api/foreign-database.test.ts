import { existsSync, mkdirSync, readdirSync, rmSync } from 'node:fs';
import { join } from 'node:path';
import { afterAll, beforeAll, expect, test } from 'vitest';
import { connect } from '../../scripts/postgres/roles.mjs';
import { withoutConfiguration } from '../../scripts/product/environment.mjs';
import { startProduct } from '../../scripts/product/product.mjs';
import { newStack } from '../../scripts/product/stack.mjs';
import { progressOn } from '../../scripts/set-up/progress.mjs';
import { newTemporaryFolder } from '../../scripts/set-up/temporary.mjs';
import { createTestDatabase, type TestDatabase } from '../support/database';
import { takeTurn, testBuild } from '../support/servers';

const stack = newStack();
let database: TestDatabase;
let folder = '';

beforeAll(async () => {
  database = await createTestDatabase();
  folder = await newTemporaryFolder('tagwire-foreign-');
});
afterAll(async () => {
  await stack.stopAll();
  await database.drop();
  rmSync(folder, { recursive: true, force: true, maxRetries: 5 });
});

const rowsOf = async () => {
  const superuser = await connect(database.superuserUrl);
  const found = await superuser.query(
    "select (select count(*)::int from public.person) as people, (select count(*)::int from record.schema_change) as changes, shobj_description(oid, 'pg_database') as mark from pg_database where datname = current_database()",
  );
  await superuser.end();
  return found.rows;
};

test('with DATABASE_URL set, the same build runs on that database and writes nothing into it by starting', async () => {
  const before = await rowsOf();
  const { folder: buildFolder, publicUrl } = testBuild();
  const turn = await takeTurn(publicUrl);
  stack.push(async () => turn.release());
  const home = join(folder, 'storage');
  mkdirSync(home);
  const said: string[] = [];
  const product = await startProduct({
    home,
    env: {
      ...withoutConfiguration(process.env),
      DATABASE_URL: database.appUrl,
      MIGRATION_DATABASE_URL: database.ownerUrl,
      PORT: new URL(publicUrl).port,
      PUBLIC_URL: publicUrl,
    },
    mode: 'serve',
    buildFolder,
    stack,
    progress: progressOn((line) => said.push(line)),
    signal: new AbortController().signal,
  });
  expect((await fetch(`${publicUrl}/healthz`)).status).toBe(200);
  expect(await rowsOf()).toEqual(before);
  expect(before).toMatchObject([{ people: 0, mark: null }]);
  expect(product.env['DATABASE_URL']).toBe(database.appUrl);
  expect(product.env['MIGRATION_DATABASE_URL']).toBeUndefined();
  expect(existsSync(join(home, 'postgres'))).toBe(false);
  expect(readdirSync(home)).toEqual(expect.arrayContaining(['objects', 'mail', 'identity']));
  expect(said.join('\n')).not.toMatch(/database|demo data/);
});
