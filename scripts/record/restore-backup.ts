import { readFileSync } from 'node:fs';
import { join, resolve } from 'node:path';
import { connect } from '../postgres/roles.mjs';
import type { Bucket } from './bucket';
import { type Manifest, readBackup } from './manifest';
import { postgresTool } from './postgres-tool';

const demandEmpty = async (ownerUrl: string): Promise<void> => {
  const client = await connect(ownerUrl);
  try {
    const { rows } = await client.query<{ n: string }>(
      `select count(*) as n from pg_tables where schemaname not in ('pg_catalog', 'information_schema')`,
    );
    if (Number(rows[0]?.n) > 0)
      throw new Error('The database is not empty. A backup is restored into an empty one only.');
  } finally {
    await client.end();
  }
};

const demandHeads = async (ownerUrl: string, { heads }: Manifest): Promise<void> => {
  const client = await connect(ownerUrl);
  try {
    const { rows } = await client.query<{ note: string }>('select note from record.checkpoint');
    const present = new Set(rows.map(({ note }) => note));
    for (const { series, note } of heads)
      if (!present.has(note)) throw new Error(`The signed head of ${series} did not come back.`);
  } finally {
    await client.end();
  }
};

/**
 * Checks the whole backup before anything is touched, then fills an empty database, owned by the
 * migrating role, and the bucket. Both roles must be there under their names.
 */
export const restoreBackup = async (to: {
  readonly ownerUrl: string;
  readonly bucket: Bucket;
  readonly folder: string;
}): Promise<Manifest> => {
  const folder = resolve(to.folder);
  const manifest = await readBackup(folder);
  await demandEmpty(to.ownerUrl);
  await postgresTool('pg_restore', to.ownerUrl, [
    '--no-owner',
    '--exit-on-error',
    '--single-transaction',
    `--dbname=${new URL(to.ownerUrl).pathname.slice(1)}`,
    join(folder, manifest.database.file),
  ]);
  for (const { key, type, file } of manifest.objects) {
    await to.bucket.write(key, readFileSync(join(folder, file)), type);
  }
  await demandHeads(to.ownerUrl, manifest);
  return manifest;
};
