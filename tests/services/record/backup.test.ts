import { mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { rm } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, beforeAll, describe, expect, inject, it } from 'vitest';
import { openDatabase } from '@/adapters/database/orm';
import { openObjects } from '@/adapters/objects/s3';
import { noticePrinter } from '@/adapters/pdf/notice-printer';
import { formatVerifierKey } from '@/domain/ledger/note/verifier-key';
import { auditLedger } from '@/services/ledger/audit/audit-ledger';
import { proveForNotice } from '@/services/ledger/proof/prove-for-notice';
import { renderNotice } from '@/services/notice/render-notice';
import { objectStoreKeys, startObjectStore } from '../../../scripts/local/object-store.mjs';
import { connect, createDatabase, withDatabase } from '../../../scripts/postgres/roles.mjs';
import { openBucket } from '../../../scripts/record/bucket';
import { makeBackup } from '../../../scripts/record/make-backup';
import { restoreBackup } from '../../../scripts/record/restore-backup';
import { get } from '../../support/bay';
import { openRecordWorld, type RecordWorld, signNow } from '../../support/record';
import { BIG_FEET, BREACH } from '../../support/verdict-case';
import { openVerdictWorld, type VerdictWorld } from '../../support/verdict-world';

let world: RecordWorld;
let v: VerdictWorld;
let folder: string;
let receipt: string;
let first: Awaited<ReturnType<typeof openStore>>;
let second: Awaited<ReturnType<typeof openStore>>;
const emptied: string[] = [];

const openStore = async (name: string) => {
  const store = await startObjectStore({
    port: 0,
    folder: join(folder, name),
    bucket: 'tagwire',
    origins: ['http://127.0.0.1:1'],
  });
  const config = {
    endpoint: store.url,
    publicEndpoint: store.url,
    region: 'us-east-1',
    bucket: 'tagwire',
    ...objectStoreKeys,
  };
  const objects = openObjects(config);
  const bucket = openBucket(config);
  const close = async () => {
    bucket.close();
    objects.close();
    await store.stop();
  };
  return { objects, bucket, close, endpoint: store.url };
};

/** An empty database, as on a new machine. */
const emptyDatabase = async (): Promise<string> => {
  const cluster = inject('cluster');
  const name = `empty_${process.pid}_${emptied.length}`;
  const client = await connect(cluster.superuserUrl);
  await createDatabase(client, name);
  await client.end();
  emptied.push(name);
  return name;
};

beforeAll(async () => {
  folder = mkdtempSync(join(tmpdir(), 'tagwire-backup-'));
  [first, second] = [await openStore('first'), await openStore('second')];
  world = await openRecordWorld({ objects: first.objects, notices: noticePrinter });
  v = await openVerdictWorld(world);
  world.clock.set('2026-07-12T14:20:00.000Z');
  const inspection = await v.addInspection('12J');
  await v.sign(inspection, BIG_FEET);
  const { verdictId } = get(await v.decide(inspection, BREACH));
  await renderNotice(world.ports(), { seriesId: v.seriesId, verdictId }, (line) =>
    proveForNotice(world.ports(), v.seriesId, line),
  );
  receipt = await signNow(world.ports(), v.seriesId);
});
afterAll(async () => {
  await world.close();
  await Promise.all([first.close(), second.close()]);
  const client = await connect(inject('cluster').superuserUrl);
  for (const name of emptied) await client.query(`drop database "${name}" with (force)`);
  await client.end();
  await rm(folder, { recursive: true, force: true });
});

const auditOf = async (appUrl: string, store: typeof first) => {
  const orm = await openDatabase(appUrl, 2);
  try {
    const key = formatVerifierKey(world.keys.signer(v.seriesId).key);
    const asked = { seriesId: v.seriesId, heads: [receipt], keys: [key] };
    return await auditLedger({ db: orm.em.fork(), objects: store.objects }, asked);
  } finally {
    await orm.close();
  }
};

describe('a backup', () => {
  it('restored on an empty machine gives the same lines, heads, rows and objects', async () => {
    const at = join(folder, 'whole');
    const { ownerUrl } = world.database;
    const { manifest } = await makeBackup({ ownerUrl, bucket: first.bucket, folder: at });
    expect(manifest.heads).toEqual([{ series: v.seriesId, note: receipt }]);
    expect(manifest.objects).toHaveLength(1);
    const name = await emptyDatabase();
    const cluster = inject('cluster');
    const restored = withDatabase(cluster.ownerUrl, name);
    await restoreBackup({ ownerUrl: restored, bucket: second.bucket, folder: at });
    const before = await auditOf(world.database.appUrl, first);
    const after = await auditOf(withDatabase(cluster.appUrl, name), second);
    // The report of this world was appended without a line of its own.
    expect(after).toEqual(before);
    expect(after.lines).toBe(before.lines);
    const again = { ownerUrl: restored, bucket: second.bucket, folder: join(folder, 'again') };
    const copy = await makeBackup(again);
    expect(copy.manifest.objects).toEqual(manifest.objects);
    expect(copy.manifest.heads).toEqual(manifest.heads);
    await expect(restoreBackup({ ...again, folder: at })).rejects.toThrow(/not empty/);
    // The application's role may do on the new machine what it might on the old one, and no more.
    const app = await connect(withDatabase(cluster.appUrl, name));
    await expect(app.query('delete from record.verdict')).rejects.toMatchObject({ code: '42501' });
    await expect(app.query('select append.next_line($1)', [v.seriesId])).resolves.toBeDefined();
    await app.end();
  });

  it('is refused when a byte of it is another, and the database stays empty', async () => {
    const at = join(folder, 'damaged');
    const from = { ownerUrl: world.database.ownerUrl, bucket: first.bucket, folder: at };
    const { manifest } = await makeBackup(from);
    const name = await emptyDatabase();
    const ownerUrl = withDatabase(inject('cluster').ownerUrl, name);
    const to = { ownerUrl, bucket: second.bucket, folder: at };
    const object = manifest.objects[0]?.file ?? '';
    for (const file of ['database.dump', object, 'manifest.json']) {
      const whole = readFileSync(join(at, file));
      const broken = Buffer.from(whole);
      const middle = Math.floor(broken.length / 2);
      broken[middle] = (broken[middle] ?? 0) ^ 1;
      writeFileSync(join(at, file), broken);
      await expect(restoreBackup(to), file).rejects.toThrow(/damaged/);
      writeFileSync(join(at, file), whole.subarray(0, -1));
      await expect(restoreBackup(to), file).rejects.toThrow(/damaged/);
      writeFileSync(join(at, file), whole);
    }
    rmSync(join(at, object));
    await expect(restoreBackup(to)).rejects.toThrow(/not whole/);
    const client = await connect(ownerUrl);
    const { rows } = await client.query("select 1 from pg_namespace where nspname = 'record'");
    await client.end();
    expect(rows).toEqual([]);
  });

  it('does not write into a folder that is there already', async () => {
    const { ownerUrl } = world.database;
    await expect(makeBackup({ ownerUrl, bucket: first.bucket, folder })).rejects.toThrow(/already/);
  });
});
