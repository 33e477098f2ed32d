import { afterAll, expect, test } from 'vitest';
import { connect } from '../../../scripts/postgres/roles.mjs';
import { createTestDatabase } from '../../support/database';

const first = await createTestDatabase();
const second = await createTestDatabase();
afterAll(async () => {
  await first.drop();
  await second.drop();
});

test('two test databases share nothing and the application connects as its own role', async () => {
  const owner = await connect(first.ownerUrl);
  await owner.query('create table public.only_in_the_first (n integer)');
  await owner.end();
  const app = await connect(second.appUrl);
  const seen = await app.query(
    "select current_user as role, to_regclass('public.only_in_the_first') as foreign_table, to_regclass('public.person') as migrated",
  );
  await app.end();
  expect(seen.rows).toEqual([{ role: 'tagwire_app', foreign_table: null, migrated: 'person' }]);
});
