import { randomUUID } from 'node:crypto';
import type { Client } from 'pg';
import { type Bench, perSecond, say, timed } from './measure';
import { appendLine, insertPlainly } from './write-line';

const BATCH = 100;
const MOST_SINGLE = 2000;

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

/** Lines beside plain inserts of the same rows, one and a hundred a transaction. */
export const benchAppending = async (
  { series, total }: Bench,
  app: Client,
  owner: Client,
): Promise<void> => {
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
    [Math.min(MOST_SINGLE, total), 1, other],
    [total, BATCH, series],
  ] as const) {
    await compare(
      count,
      size,
      { client: owner, one: (index) => insertPlainly(owner, id, index) },
      { client: app, one: () => appendLine(app, id) },
    );
  }
};
