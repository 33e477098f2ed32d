import { createHash, generateKeyPairSync, randomBytes, randomUUID, sign } from 'node:crypto';
import { rmSync } from 'node:fs';
import { join } from 'node:path';
import type { Client } from 'pg';
import { migrate } from '@/adapters/database/migrate';
import { openDatabase } from '@/adapters/database/orm';
import { toHex, utf8 } from '@/domain/ledger/bytes';
import { canonicalJson } from '@/domain/ledger/canonical';
import { openCheckpoint, originOf, signCheckpoint } from '@/domain/ledger/checkpoint';
import { commit } from '@/domain/ledger/commitment';
import { lineLeaf, lineText } from '@/domain/ledger/line';
import { verifierKey } from '@/domain/ledger/note/verifier-key';
import {
  fillPlan,
  type ProofPlan,
  planConsistency,
  planInclusion,
  planRoot,
} from '@/domain/ledger/proof';
import { appendLeaf, EMPTY, foldSubtrees, type NodeAt, rootOf } from '@/domain/ledger/tree';
import { checkLine } from '@/domain/ledger/verify/check-line';
import { conclude } from '@/domain/ledger/verify/step';
import { verifyConsistency, verifyInclusion } from '@/domain/ledger/verify-proof';
import type { RowsDocument } from '@/services/act/with-rows';
import { digestsNow } from '@/services/ledger/audit/act-digests';
import { auditLedger } from '@/services/ledger/audit/audit-ledger';
import type { Objects } from '@/services/ports';
import { startCluster } from '../postgres/cluster.mjs';
import { connect } from '../postgres/roles.mjs';
import { ensurePostgres } from '../set-up/packages.mjs';
import { rememberedPorts } from '../set-up/ports.mjs';
import { newTemporaryFolder } from '../set-up/temporary.mjs';

/**
 * Appends lines to a ledger on a throw-away PostgreSQL, beside plain inserts of the same rows, then
 * verifies and audits all of it. A line is written as an act writes it: claimed, answered, with the
 * digest of its rows. Usage: npx tsx scripts/bench/ledger.ts [lines, default 100000]
 */
const total = Number(process.argv[2] ?? 100_000);
const BATCH = 100;
const SINGLE = Math.min(2000, total);

const timed = async <T>(work: () => Promise<T> | T): Promise<{ value: T; ms: number }> => {
  const start = process.hrtime.bigint();
  const value = await work();
  return { value, ms: Number(process.hrtime.bigint() - start) / 1e6 };
};

const perSecond = (count: number, ms: number): string =>
  `${Math.round((count * 1000) / ms).toLocaleString('en')} a second`;

const say = (text: string): void => console.log(text);

const series = randomUUID();

interface Content {
  readonly role: string;
  readonly salt: Uint8Array;
  readonly content: string;
}

const lineOf = (
  seriesId: string,
  index: number,
  act: string,
  contents: readonly Content[],
): string =>
  lineText({
    series: seriesId,
    index,
    kind: 'report-signed',
    at: new Date().toISOString(),
    act,
    commitments: Object.fromEntries(
      contents.map(({ role, salt, content }) => [role, toHex(commit(salt, utf8(content)))]),
    ),
  });

const newContent = (role: string, content: string): Content => ({
  role,
  salt: randomBytes(32),
  content,
});

const newLine = (seriesId: string, index: number): string =>
  lineOf(seriesId, index, randomUUID(), [newContent('report', `report ${index}`)]);

const append = async (client: Client, seriesId: string): Promise<void> => {
  const act = randomUUID();
  await client.query('select append.claim_act($1, $2, null, $3, $4)', [
    act,
    seriesId,
    'bench',
    randomBytes(32),
  ]);
  const closed = await client.query<{ rows: object; index: string }>(
    'select * from append.close_act($1, $2, $3, $4)',
    [act, '{"value":null}', ['act'], seriesId],
  );
  const rows = canonicalJson({
    document: 'tagwire/act-rows',
    version: '1',
    ...closed.rows[0]?.rows,
    open: ['report'],
  });
  const index = Number(closed.rows[0]?.index);
  const contents = [newContent('report', `report ${index}`), newContent('rows', rows)];
  await client.query('select append.ledger_line($1, $2, $3, $4, $5, $6::jsonb)', [
    seriesId,
    index,
    'report-signed',
    lineOf(seriesId, index, act, contents),
    act,
    JSON.stringify(
      contents.map(({ role, salt, content }) => ({
        role,
        open: role === 'report',
        salt: `\\x${toHex(salt)}`,
        content,
      })),
    ),
  ]);
};

const insertPlainly = async (client: Client, seriesId: string, index: number): Promise<void> => {
  const line = newLine(seriesId, index);
  await client.query('insert into public.bench_plain values ($1, $2, $3, $4, $5, $6)', [
    seriesId,
    index,
    'report-signed',
    line,
    lineLeaf(line),
    randomUUID(),
  ]);
};

const inTransaction = async (
  client: Client,
  indices: readonly number[],
  one: (index: number) => Promise<void>,
): Promise<number> => {
  const { ms } = await timed(async () => {
    await client.query('begin');
    for (const index of indices) await one(index);
    await client.query('commit');
  });
  return ms;
};

/** Both ways turn about, so that what else the machine does weighs on both alike. */
const compare = async (
  count: number,
  size: number,
  plain: { client: Client; one: (index: number) => Promise<void> },
  ledger: { client: Client; one: (index: number) => Promise<void> },
): Promise<void> => {
  let plainMs = 0;
  let ledgerMs = 0;
  for (let from = 0; from < count; from += size) {
    const indices = Array.from({ length: Math.min(size, count - from) }, (_, i) => from + i);
    plainMs += await inTransaction(plain.client, indices, plain.one);
    ledgerMs += await inTransaction(ledger.client, indices, ledger.one);
  }
  say(`${String(size).padStart(3)} a transaction  plain insert ${perSecond(count, plainMs)}`);
  const times = (ledgerMs / plainMs).toFixed(1);
  say(
    `                   ledger line  ${perSecond(count, ledgerMs)}, ${times} times a plain insert`,
  );
};

const readNodes = async (client: Client, plan: ProofPlan | readonly NodeAt[]) => {
  const nodes = plan.flat();
  const { rows } = await client.query<{ level: number; index: string; hash: Buffer }>(
    `select n.level, n.index, n.hash from record.ledger_node n
     join unnest($2::smallint[], $3::bigint[]) as wanted (level, index) using (level, index)
     where n.series_id = $1`,
    [series, nodes.map(({ level }) => level), nodes.map(({ index }) => index)],
  );
  const found = new Map(
    rows.map((row) => [`${row.level}/${row.index}`, Uint8Array.from(row.hash)]),
  );
  return ({ level, index }: NodeAt): Uint8Array => {
    const hash = found.get(`${level}/${index}`);
    if (hash === undefined) throw new Error(`Node ${level}/${index} is missing.`);
    return hash;
  };
};

const demand = (holds: boolean, what: string): void => {
  if (!holds) throw new Error(`Does not hold: ${what}`);
};

const inMemory = async (): Promise<void> => {
  const lines = await timed(() => Array.from({ length: total }, (_, i) => newLine(series, i)));
  say(`memory  lines written            ${perSecond(total, lines.ms)}`);
  const grown = await timed(() => {
    let frontier = EMPTY;
    for (const line of lines.value) frontier = appendLeaf(frontier, lineLeaf(line)).frontier;
    return frontier;
  });
  say(`memory  leaves hashed, appended  ${perSecond(total, grown.ms)}`);
};

const appending = async (app: Client, owner: Client): Promise<void> => {
  const other = randomUUID();
  for (const id of [series, other]) {
    await owner.query(
      `insert into public.series (id, slug, name, zone, currency, protest_minutes, appeal_days, bond_minor, created_at)
       values ($1, $2, 'Bench', 'UTC', 'USD', 30, 5, 0, now())`,
      [id, `bench-${id.slice(0, 8)}`],
    );
    await app.query('select append.open_ledger($1)', [id]);
  }
  await owner.query(
    `create table public.bench_plain (series_id uuid, index bigint, kind text not null, line text not null,
     leaf_hash bytea not null, act_id uuid, primary key (series_id, index))`,
  );
  for (const [count, size, id] of [
    [SINGLE, 1, other],
    [total, BATCH, series],
  ] as const) {
    await compare(
      count,
      size,
      { client: owner, one: (index) => insertPlainly(owner, id, index) },
      { client: app, one: () => append(app, id) },
    );
  }
};

const verifying = async (app: Client): Promise<void> => {
  const pair = generateKeyPairSync('ed25519');
  const spki = pair.publicKey.export({ format: 'der', type: 'spki' });
  const key = verifierKey(originOf('bench.example', series), Uint8Array.from(spki.subarray(-32)));
  const root = foldSubtrees(planRoot(total).map(await readNodes(app, planRoot(total))));
  const checkpoint = await signCheckpoint({ origin: key.name, size: total, root }, [
    { key, sign: (message) => Uint8Array.from(sign(null, message, pair.privateKey)) },
  ]);
  demand(openCheckpoint(checkpoint, [key]).ok, 'the signed head');

  const { rows } = await app.query<{ line: string }>(
    'select line from record.ledger_line where series_id = $1 order by index',
    [series],
  );
  demand(rows.length === total, 'the number of lines');
  const whole = await timed(() => {
    let frontier = EMPTY;
    for (const { line } of rows) frontier = appendLeaf(frontier, lineLeaf(line)).frontier;
    return rootOf(frontier);
  });
  demand(toHex(whole.value) === toHex(root), 'the root of all lines');
  say(`verified whole       ${total.toLocaleString('en')} lines, ${perSecond(total, whole.ms)}`);

  for (const size of [...new Set([100, 1000, 10_000, total])].filter((n) => n <= total)) {
    const head = foldSubtrees(planRoot(size).map(await readNodes(app, planRoot(size))));
    const indices = Array.from(
      { length: 200 },
      (_, i) => createHash('sha256').update(`${size} ${i}`).digest().readUInt32BE(0) % size,
    );
    let hashes = 0;
    const made = await timed(async () => {
      const paths = [];
      for (const index of indices) {
        const plan = planInclusion(index, size);
        const path = fillPlan(plan, await readNodes(app, plan));
        hashes = Math.max(hashes, path.length);
        paths.push({ index, path });
      }
      return paths;
    });
    const checked = await timed(() =>
      made.value.every(({ index, path }) =>
        verifyInclusion({
          leafHash: lineLeaf(rows[index]?.line ?? ''),
          index,
          size,
          path,
          root: head,
        }),
      ),
    );
    demand(checked.value, `inclusion at ${size}`);
    say(
      `inclusion at ${String(size).padStart(7)} ${hashes} hashes (${hashes * 32} bytes), ` +
        `read in ${(made.ms / 200).toFixed(2)} ms, verified in ${(checked.ms / 200).toFixed(3)} ms`,
    );
  }

  const older = Math.ceil(total / 3);
  const plan = planConsistency(older, total);
  const path = fillPlan(plan, await readNodes(app, plan));
  const olderRoot = foldSubtrees(planRoot(older).map(await readNodes(app, planRoot(older))));
  const claim = { first: { size: older, root: olderRoot }, second: { size: total, root }, path };
  demand(verifyConsistency(claim), 'consistency');
  say(`consistency ${older} → ${total}: ${path.length} hashes (${path.length * 32} bytes)`);

  const index = Math.floor(total / 2);
  const inclusion = planInclusion(index, total);
  const proof = {
    line: rows[index]?.line ?? '',
    path: fillPlan(inclusion, await readNodes(app, inclusion)).map(toHex),
    checkpoint,
  };
  const signed = await timed(() => checkLine(proof, [key]));
  demand(conclude(signed.value.steps) === 'passed', 'a line under the signed head');
  const bytes = JSON.stringify(proof).length;
  say(`a line with its signed head: ${bytes} bytes, verified in ${signed.ms.toFixed(1)} ms`);
};

const noObjects: Objects = {
  presignPut: () => Promise.reject(new Error('There are no objects here.')),
  findHead: () => Promise.resolve(undefined),
  read: () => Promise.reject(new Error('There are no objects here.')),
  write: () => Promise.resolve(),
  remove: () => Promise.resolve(),
};

/** The whole audit, and beside it what its digests of rows cost when each line asks for its own. */
const auditing = async (app: Client, appUrl: string): Promise<void> => {
  const orm = await openDatabase(appUrl, 2);
  try {
    const asked = { seriesId: series, heads: [], keys: [] };
    const audit = await timed(() => auditLedger({ db: orm.em.fork(), objects: noObjects }, asked));
    demand(audit.value.faults.length === 0, audit.value.faults[0]?.words ?? 'the audit');
    demand(audit.value.lines === total, 'the number of lines audited');
    say(`audited whole        ${total.toLocaleString('en')} lines, ${perSecond(total, audit.ms)}`);
    const some = Math.min(20_000, total);
    const { rows } = await app.query<{ act: string; content: string }>(
      `select l.act_id as act, c.content from record.ledger_line l
       join record.ledger_content c on c.series_id = l.series_id and c.line_index = l.index
       where l.series_id = $1 and c.role = 'rows' order by l.index limit $2`,
      [series, some],
    );
    const single = await timed(async () => {
      for (const { act, content } of rows) {
        const { columns, digest } = JSON.parse(content) as RowsDocument;
        const now = await app.query<{ digest: string }>(
          "select append.act_digest($1, $2, $3) ->> 'digest' as digest",
          [act, Object.keys(columns), JSON.stringify(columns)],
        );
        demand(now.rows[0]?.digest === digest, 'the digest of an act’s rows');
      }
    });
    const named = rows.map(({ act, content }, line) => ({
      act,
      line,
      document: JSON.parse(content) as RowsDocument,
    }));
    const many = await timed(async () => {
      for (let from = 0; from < named.length; from += 500) {
        const block = named.slice(from, from + 500);
        const digests = await digestsNow(orm.em.fork(), block);
        demand(
          block.every(({ line, document }) => digests.get(line) === document.digest),
          'the digests of a block',
        );
      }
    });
    say(
      `digests of rows      ${some.toLocaleString('en')} lines, ${perSecond(some, many.ms)}, 500 lines a query`,
    );
    say(
      `                     for comparison, by a query a line: ${some.toLocaleString('en')} lines, ${perSecond(some, single.ms)}`,
    );
  } finally {
    await orm.close();
  }
};

await ensurePostgres();
const home = await newTemporaryFolder('tagwire-bench-');
const { database } = await rememberedPorts(join(home, 'ports.json'), ['database']);
if (database === undefined) throw new Error('No free port.');
const cluster = await startCluster({ home, port: database });
try {
  await migrate({ ownerUrl: cluster.ownerUrl });
  const [app, owner] = await Promise.all([connect(cluster.appUrl), connect(cluster.ownerUrl)]);
  await inMemory();
  await appending(app, owner);
  await verifying(app);
  await auditing(app, cluster.appUrl);
  await Promise.all([app.end(), owner.end()]);
} finally {
  await cluster.stop();
  rmSync(home, { recursive: true, force: true });
}
