import { execFile } from 'node:child_process';
import { createHash } from 'node:crypto';
import { mkdtempSync, readFileSync, writeFileSync } from 'node:fs';
import { rm } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, beforeAll, describe, expect, inject, it } from 'vitest';
import { openObjects } from '@/adapters/objects/s3';
import { formatVerifierKey } from '@/domain/ledger/note/verifier-key';
import { eraseContent } from '@/services/ledger/erasure/erase-content';
import { removeObjects } from '@/services/ledger/erasure/remove-objects';
import { objectStoreKeys, startObjectStore } from '../../../scripts/local/object-store.mjs';
import { connect, createDatabase, withDatabase } from '../../../scripts/postgres/roles.mjs';
import { openBucket } from '../../../scripts/record/bucket';
import {
  fullDraft,
  handIn,
  keepPhotograph,
  openPaddock,
  type Paddock,
  picture,
  save,
  start,
} from '../../support/paperwork';
import { openRecordWorld, type RecordWorld, signNow } from '../../support/record';
import { must } from '../rulebook/build';

const root = join(import.meta.dirname, '../../..');
const NOTE = 'Springs came from the blue van';
const NOWHERE = 'http://127.0.0.1:1';

interface Machine {
  readonly ownerUrl: string;
  readonly appUrl: string;
  readonly store: string;
}

let world: RecordWorld;
let paddock: Paddock;
let folder: string;
let first: Machine;
/** The second of two that were handed in: the one that is erased. */
let paperworkId: string;
/** Signed heads kept elsewhere: of the moment of the backup, and of after an erasure. */
let early: string;
let late: string;
let key: string;
const ended: (() => Promise<void>)[] = [];

const openStore = async (name: string): Promise<string> => {
  const at = { port: 0, folder: join(folder, name), bucket: 'tagwire', origins: [NOWHERE] };
  const store = await startObjectStore(at);
  ended.push(() => store.stop());
  return store.url;
};

const storeConfig = (url: string) => ({
  endpoint: url,
  publicEndpoint: url,
  region: 'us-east-1',
  bucket: 'tagwire',
  ...objectStoreKeys,
});

/** A machine with an empty database and an empty bucket. */
const emptyMachine = async (name: string): Promise<Machine> => {
  const { superuserUrl, ownerUrl, appUrl } = inject('cluster');
  const database = `commands_${process.pid}_${name}`;
  const client = await connect(superuserUrl);
  await createDatabase(client, database);
  await client.end();
  ended.push(async () => {
    const again = await connect(superuserUrl);
    await again.query(`drop database "${database}" with (force)`);
    await again.end();
  });
  return {
    ownerUrl: withDatabase(ownerUrl, database),
    appUrl: withDatabase(appUrl, database),
    store: await openStore(name),
  };
};

/** Runs one of the commands as whoever runs the installation does, on one machine. */
const call = (machine: Machine, script: string, ...words: readonly string[]) =>
  new Promise<{ readonly code: number; readonly out: string; readonly err: string }>((resolve) => {
    const env = {
      PATH: process.env['PATH'],
      NODE_NO_WARNINGS: '1',
      MIGRATION_DATABASE_URL: machine.ownerUrl,
      DATABASE_URL: machine.appUrl,
      S3_ENDPOINT: machine.store,
      S3_BUCKET: 'tagwire',
      S3_ACCESS_KEY_ID: objectStoreKeys.accessKeyId,
      S3_SECRET_ACCESS_KEY: objectStoreKeys.secretAccessKey,
      PUBLIC_URL: NOWHERE,
      PORT: '1',
      SMTP_URL: 'smtp://127.0.0.1:1',
      MAIL_FROM: 'Tagwire <tagwire@example.org>',
      OIDC_ISSUER: NOWHERE,
      OIDC_CLIENT_ID: 'none',
      OIDC_CLIENT_SECRET: 'none',
      LEDGER_KEY_FILE: 'none',
      STORAGE_DIR: folder,
    };
    const args = ['--import', 'tsx', join(root, `scripts/record/${script}.ts`), ...words];
    execFile(process.execPath, args, { cwd: root, env }, (error, out, err) =>
      resolve({ code: error === null ? 0 : Number(error.code), out, err }),
    );
  });

/** Every leaf, root, row hash and object of a machine, as one hash. */
const fingerprint = async ({ ownerUrl, store }: Machine): Promise<string> => {
  const hash = createHash('sha256');
  const client = await connect(ownerUrl);
  const { rows: tables } = await client.query<{ name: string }>(
    `select format('%I.%I', schemaname, tablename) as name from pg_tables
     where schemaname in ('record', 'public') order by 1`,
  );
  for (const { name } of tables) {
    const { rows } = await client.query<{ sum: string }>(
      `select name_sum.sum from (select md5(coalesce(string_agg(t::text, chr(10) order by t::text), '')) as sum
       from ${name} t) name_sum`,
    );
    hash.update(`${name} ${rows[0]?.sum}\n`);
  }
  await client.end();
  const bucket = openBucket(storeConfig(store));
  for (const one of await bucket.keys()) hash.update(one).update((await bucket.read(one)).bytes);
  bucket.close();
  return hash.digest('hex');
};

const isSaid = async ({ ownerUrl }: Machine): Promise<boolean> => {
  const client = await connect(ownerUrl);
  const { rows } = await client.query(
    'select 1 from record.ledger_content where position($1 in content) > 0',
    [NOTE],
  );
  await client.end();
  return rows.length > 0;
};

const put = (name: string, content: string): string => {
  const file = join(folder, name);
  writeFileSync(file, content);
  return file;
};

beforeAll(async () => {
  folder = mkdtempSync(join(tmpdir(), 'tagwire-commands-'));
  const store = await openStore('first');
  const objects = openObjects(storeConfig(store));
  ended.push(async () => objects.close());
  world = await openRecordWorld();
  const { ownerUrl, appUrl } = world.database;
  first = { ownerUrl, appUrl, store };
  const opened = await openPaddock(world);
  paddock = { ...opened, ports: () => ({ ...opened.ports(), objects }) };
  for (const [at, note] of ['', NOTE].entries()) {
    paperworkId = await start(paddock, String(at + 1));
    await keepPhotograph(paddock, paperworkId, await picture(321 + at));
    const draft = { ...fullDraft(), note };
    await handIn(paddock, paperworkId, await save(paddock, paperworkId, 1, draft));
  }
  early = put('early.note', await signNow(paddock.ports(), paddock.seriesId));
  key = formatVerifierKey(world.keys.signer(paddock.seriesId).key);
});
afterAll(async () => {
  for (const end of ended.reverse()) await end();
  await world.close();
  await rm(folder, { recursive: true, force: true });
});

describe('the record’s commands, each as a process of its own', () => {
  it('say how they are used, and end with 1', async () => {
    for (const [script, ...words] of [
      ['backup'],
      ['backup', 'one', 'two'],
      ['restore'],
      ['audit', '--no-such-flag'],
      ['erasures'],
      ['erasures', 'apply'],
    ] as const) {
      const said = await call(first, script, ...words);
      expect([script, said.code]).toEqual([script, 1]);
      expect(said.err).toContain(
        `usage: npm run ${script === 'erasures' ? '--silent ' : ''}${script}`,
      );
    }
  }, 120_000);

  it('audit, back up, restore on an empty machine with identical hashes, and audit there', async () => {
    const good = await call(first, 'audit', early, '--key', key);
    expect(good).toMatchObject({ code: 0, err: '' });
    expect(good.out).toMatch(/: \d+ lines, \d signed heads, 0 faults\n$/);
    const forged = readFileSync(early, 'utf8').replace(/\n(\d+)\n/, '\n9$1\n');
    const bad = await call(first, 'audit', put('forged.note', forged), '--key', key);
    expect(bad.code).toBe(1);
    expect(bad.out).toMatch(/head 1 that was brought/);

    const copy = join(folder, 'copy');
    const made = await call(first, 'backup', copy);
    expect(made).toMatchObject({ code: 0, err: '' });
    expect(made.out).toMatch(
      /^[12] objects, 1 ledgers\.\nSHA-256 of the manifest: [0-9a-f]{64}\n$/,
    );
    const again = await call(first, 'backup', copy);
    expect(again.code).toBe(1);
    expect(again.err).toContain('is there already');

    const empty = await emptyMachine('empty');
    expect(await call(empty, 'restore', copy)).toMatchObject({ code: 0, err: '' });
    expect(await fingerprint(empty)).toBe(await fingerprint(first));
    const there = await call(empty, 'audit', early, '--key', key);
    expect(there).toEqual(good);
    const twice = await call(empty, 'restore', copy);
    expect(twice.code).toBe(1);
    expect(twice.err).toContain('not empty');
  }, 120_000);

  it('refuse a backup of which one byte is another, and leave the machine empty', async () => {
    const copy = join(folder, 'damaged');
    expect((await call(first, 'backup', copy)).code).toBe(0);
    const file = join(copy, 'database.dump');
    const bytes = readFileSync(file);
    bytes[bytes.length >> 1] = (bytes[bytes.length >> 1] ?? 0) ^ 1;
    writeFileSync(file, bytes);
    const target = await emptyMachine('damaged_target');
    const refused = await call(target, 'restore', copy);
    expect(refused.code).toBe(1);
    expect(refused.err).toContain('damaged or not whole: database.dump');
    const client = await connect(target.ownerUrl);
    const { rows } = await client.query("select 1 from pg_namespace where nspname = 'record'");
    await client.end();
    expect(rows).toEqual([]);
    const bucket = openBucket(storeConfig(target.store));
    expect(await bucket.keys()).toEqual([]);
    bucket.close();
  }, 120_000);

  it('list erasures, and erase again on a machine where an older backup was restored', async () => {
    const older = join(folder, 'older');
    expect((await call(first, 'backup', older)).code).toBe(0);
    const { seriesId } = paddock;
    const reason = 'The season’s retention time has passed.';
    const asked = { act: paddock.uuid(), seriesId, paperworkId, reason };
    must(await eraseContent(paddock.ports(), paddock.official, asked));
    await removeObjects(paddock.ports(), { seriesId });
    late = put('late.note', await signNow(paddock.ports(), seriesId));
    const listed = await call(first, 'erasures', 'list');
    expect(listed).toMatchObject({ code: 0, err: '' });
    const list = put('erasures.json', listed.out);
    expect(JSON.parse(listed.out)).toHaveLength(1);
    expect((await call(first, 'erasures', 'apply', list)).out).toBe(
      '0 erased again; of 1 nothing is here.\n',
    );

    const back = await emptyMachine('back');
    expect((await call(back, 'restore', older)).code).toBe(0);
    expect(await isSaid(back)).toBe(true);
    const behind = await call(back, 'audit', late, '--key', key);
    expect(behind.code).toBe(1);
    expect(behind.out).toMatch(/1 of them are gone/);

    const other = put('other.json', listed.out.replace('retention', 'holding'));
    const forged = await call(back, 'erasures', 'apply', other);
    expect(forged).toMatchObject({ code: 1 });
    expect(forged.err).toContain('Number 1 of the list is no erasure');
    expect(await isSaid(back)).toBe(true);
    const applied = await call(back, 'erasures', 'apply', list);
    expect(applied).toMatchObject({ code: 0, out: '1 erased again; of 0 nothing is here.\n' });
    expect(await isSaid(back)).toBe(false);
    const bucket = openBucket(storeConfig(back.store));
    expect(await bucket.keys()).toHaveLength(1);
    bucket.close();
    expect(await call(back, 'audit', early, '--key', key)).toMatchObject({ code: 0 });
  }, 120_000);
});
