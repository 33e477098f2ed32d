import { createHash } from 'node:crypto';
import { existsSync, mkdirSync, statSync, writeFileSync } from 'node:fs';
import { join, resolve } from 'node:path';
import { connect } from '../postgres/roles.mjs';
import type { Bucket } from './bucket';
import { type Manifest, sha256File, writeManifest } from './manifest';
import { postgresTool } from './postgres-tool';

const readHeads = async (ownerUrl: string): Promise<Manifest['heads']> => {
  const client = await connect(ownerUrl);
  try {
    const { rows } = await client.query<{ series: string; note: string }>(
      `select distinct on (series_id) series_id as series, note from record.checkpoint
       order by series_id, size desc`,
    );
    return rows;
  } finally {
    await client.end();
  }
};

/**
 * Writes database and objects into a new folder. The heads are read before the database's snapshot
 * and the objects after it, so that the backup holds every line under the heads and every object
 * that its rows name: objects are only ever added, under the hash of their content.
 */
export const makeBackup = async (from: {
  readonly ownerUrl: string;
  readonly bucket: Bucket;
  readonly folder: string;
}): Promise<{ readonly manifest: Manifest; readonly sum: string }> => {
  const folder = resolve(from.folder);
  if (existsSync(folder)) throw new Error(`${folder} is there already; name a new folder.`);
  mkdirSync(join(folder, 'objects'), { recursive: true, mode: 0o700 });
  const heads = await readHeads(from.ownerUrl);
  const dump = join(folder, 'database.dump');
  await postgresTool('pg_dump', from.ownerUrl, ['--format=custom', `--file=${dump}`]);
  const objects: Manifest['objects'] = [];
  for (const key of await from.bucket.keys()) {
    const { bytes, type } = await from.bucket.read(key);
    const sha256 = createHash('sha256').update(bytes).digest('hex');
    const file = `objects/${sha256}`;
    writeFileSync(join(folder, file), bytes);
    objects.push({ key, type, file, sha256, bytes: bytes.length });
  }
  const manifest: Manifest = {
    v: '1',
    type: 'tagwire/backup',
    madeAt: new Date().toISOString(),
    database: {
      file: 'database.dump',
      sha256: await sha256File(dump),
      bytes: statSync(dump).size,
    },
    objects,
    heads,
  };
  return { manifest, sum: writeManifest(folder, manifest) };
};
