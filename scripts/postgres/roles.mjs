import { Problem } from '../set-up/problem.mjs';

const inUse = '57P03';

/**
 * @param {string} url
 * @returns {Promise<import('pg').Client>} connected; the caller ends it
 */
export async function connect(url) {
  const { default: pg } = await import('pg');
  const client = new pg.Client({ connectionString: url, connectionTimeoutMillis: 10_000 });
  try {
    await client.connect();
  } catch (error) {
    if (error instanceof Error && 'code' in error && error.code === inUse) {
      throw new Problem('The database is still starting up.', 'Wait a moment, then run again.');
    }
    throw error;
  }
  return client;
}

/**
 * The two roles and one database, made where they are missing. The owner may change the schema
 * and is used by migrations alone; the application's role owns nothing and inherits nothing.
 *
 * @param {object} wanted
 * @param {string} wanted.superuserUrl
 * @param {string} wanted.database
 * @param {string} wanted.owner the owner's password
 * @param {string} wanted.app the application's password
 */
export async function prepareDatabase({ superuserUrl, database, owner, app }) {
  const client = await connect(superuserUrl);
  try {
    const roles = await client.query(
      "select rolname from pg_roles where rolname in ('tagwire_owner', 'tagwire_app')",
    );
    const present = new Set(roles.rows.map((row) => row.rolname));
    const limits = 'nosuperuser nocreatedb nocreaterole noreplication nobypassrls';
    if (!present.has('tagwire_owner')) {
      await client.query(`create role tagwire_owner login ${limits} password '${owner}'`);
    }
    if (!present.has('tagwire_app')) {
      await client.query(`create role tagwire_app login noinherit ${limits} password '${app}'`);
    }
    const found = await client.query('select 1 from pg_database where datname = $1', [database]);
    if (found.rowCount === 0) await createDatabase(client, database);
  } finally {
    await client.end();
  }
}

/**
 * An empty database, or a copy of another one, that only the two roles may enter.
 *
 * @param {import('pg').Client} superuser
 * @param {string} name an identifier of this code's own making
 * @param {string} [template]
 */
export async function createDatabase(superuser, name, template = 'template1') {
  await superuser.query(`create database "${name}" owner tagwire_owner template "${template}"`);
  await superuser.query(`revoke all on database "${name}" from public`);
  await superuser.query(`grant connect on database "${name}" to tagwire_app`);
}

/**
 * @param {string} url
 * @param {string} name
 * @returns {string} the address of another database of the same cluster
 */
export function withDatabase(url, name) {
  const changed = new URL(url);
  changed.pathname = `/${name}`;
  return changed.href;
}
