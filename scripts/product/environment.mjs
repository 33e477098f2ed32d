import { generateKeyPairSync } from 'node:crypto';
import { existsSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';

/** Every variable that configures the product; a test run begins without any of them. */
export const variables = [
  'PUBLIC_URL',
  'HOST',
  'PORT',
  'DATABASE_URL',
  'MIGRATION_DATABASE_URL',
  'S3_ENDPOINT',
  'S3_PUBLIC_ENDPOINT',
  'S3_REGION',
  'S3_BUCKET',
  'S3_ACCESS_KEY_ID',
  'S3_SECRET_ACCESS_KEY',
  'SMTP_URL',
  'MAIL_FROM',
  'MAIL_BOUNCES',
  'MAIL_BOUNCE_KEY',
  'OIDC_ISSUER',
  'OIDC_CLIENT_ID',
  'OIDC_CLIENT_SECRET',
  'LEDGER_NAME',
  'LEDGER_KEY_FILE',
  'LEDGER_PREVIOUS_KEY_FILE',
  'STORAGE_DIR',
  'TRUSTED_PROXY',
  'WORKER',
];

/** @type {Record<'database' | 'objects' | 'mail' | 'identity', readonly string[]>} */
const groups = {
  database: ['DATABASE_URL'],
  objects: ['S3_ENDPOINT', 'S3_BUCKET', 'S3_ACCESS_KEY_ID', 'S3_SECRET_ACCESS_KEY'],
  mail: ['SMTP_URL'],
  identity: ['OIDC_ISSUER', 'OIDC_CLIENT_ID', 'OIDC_CLIENT_SECRET'],
};

/**
 * Which stand-ins are wanted: each where no variable of its own group is set.
 *
 * @param {NodeJS.ProcessEnv} env
 * @returns {Record<'database' | 'objects' | 'mail' | 'identity', boolean>}
 */
export function wantedStandIns(env) {
  /** @param {readonly string[]} names */
  const unset = (names) => names.every((name) => (env[name] ?? '') === '');
  return {
    database: unset(groups.database),
    objects: unset(groups.objects),
    mail: unset(groups.mail),
    identity: unset(groups.identity),
  };
}

/**
 * @param {NodeJS.ProcessEnv} env
 * @returns {NodeJS.ProcessEnv} the same without a variable of the product
 */
export function withoutConfiguration(env) {
  const own = new Set(variables);
  return Object.fromEntries(Object.entries(env).filter(([name]) => !own.has(name)));
}

/**
 * The key that signs the ledger's heads: made once, kept outside the database.
 *
 * @param {string} home
 * @returns {string} its file
 */
export function ensureLedgerKey(home) {
  const file = join(home, 'ledger-key.pem');
  if (!existsSync(file)) {
    const { privateKey } = generateKeyPairSync('ed25519');
    const pem = privateKey.export({ type: 'pkcs8', format: 'pem' });
    writeFileSync(file, pem, { mode: 0o600, flag: 'wx' });
  }
  return file;
}
