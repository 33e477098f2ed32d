import { type ChildProcess, fork } from 'node:child_process';
import { once } from 'node:events';
import { join } from 'node:path';
import { afterAll, beforeAll, expect, it } from 'vitest';
import { systemRandom } from '@/adapters/system/system';
import type { CapturesAnswer, CapturesRequest } from '@/contracts/inspection/captures';
import { toHex } from '@/domain/ledger/bytes';
import { chainHead } from '@/domain/ledger/chain';
import { openInspection, openRaceNight, type RaceNight, rowsFor } from '../../support/bay';
import { openWorld, type World } from '../../support/world';

const CLIENTS = 8;
/** Sendings of each client, three readings in each. */
const SENDINGS = 10;
const KILLS = 2;
const SERVER = join(import.meta.dirname, '../../support/capture-server.ts');

let world: World;
let night: RaceNight;
let inspectionId: string;
let server: ChildProcess;
let port = 0;

const start = async (): Promise<void> => {
  server = fork(SERVER, [], {
    execArgv: ['--import', 'tsx'],
    env: {
      ...process.env,
      DATABASE_URL: world.database.appUrl,
      ACTOR: JSON.stringify(night.inspector),
      PORT: String(port),
    },
    stdio: ['ignore', 'ignore', 'inherit', 'ipc'],
  });
  const [message] = (await once(server, 'message')) as [{ port: number }];
  port = message.port;
};

const kill = async (): Promise<void> => {
  const gone = once(server, 'exit');
  server.kill('SIGKILL');
  await gone;
};

beforeAll(async () => {
  world = await openWorld();
  night = await openRaceNight(world);
  inspectionId = await openInspection(world, night, '1');
  await start();
});
afterAll(async () => {
  await kill();
  await world.close();
});

/** Requests that got no answer because the server was gone. */
let cutOff = 0;

/** Sends until there is an answer, the same act each time, as a tablet does. */
const insist = async (body: CapturesRequest): Promise<CapturesAnswer> => {
  for (;;) {
    const answer = await fetch(`http://127.0.0.1:${port}/${inspectionId}`, {
      method: 'POST',
      body: JSON.stringify(body),
    })
      .then(async (response) => (response.ok ? ((await response.json()) as CapturesAnswer) : null))
      .catch(() => undefined);
    if (answer === null) throw new Error('The server read it and refused it.');
    if (answer !== undefined) return answer;
    cutOff += 1;
    await new Promise((resolve) => setTimeout(resolve, 20));
  }
};

it('killed while eight clients save readings, loses and doubles nothing it acknowledged', async () => {
  const acknowledged: { act: string; ids: readonly string[]; answer: CapturesAnswer }[] = [];
  const { reading } = rowsFor(world, night);
  const client = async () => {
    for (let i = 0; i < SENDINGS; i += 1) {
      const rows = [reading({}), reading({}), reading({})];
      const body = { act: systemRandom.uuid(), clockOffsetMs: 0, rows };
      const answer = await insist(body);
      acknowledged.push({ act: body.act, ids: rows.map((row) => row.id), answer });
    }
  };
  const killer = async () => {
    for (let i = 1; i <= KILLS; i += 1) {
      // Each time in full run: so many answers in, as many requests under way as there are clients.
      const enough = (i * CLIENTS * SENDINGS) / (KILLS + 1);
      while (acknowledged.length < enough) await new Promise((resolve) => setTimeout(resolve, 5));
      await kill();
      await start();
    }
  };
  await Promise.all([...Array.from({ length: CLIENTS }, client), killer()]);

  const { db } = world.ports();
  const batches = await db.execute<
    { number: number; act_id: string; document: string; head: Buffer }[]
  >(
    'select number, act_id, document, head from record.capture_batch where inspection_id = ? order by number',
    [inspectionId],
  );
  const rows = await db.execute<{ id: string; batch: number }[]>(
    'select id, batch from record.reading where inspection_id = ?',
    [inspectionId],
  );
  // The kills fell into running requests, or this test would show nothing.
  expect(cutOff).toBeGreaterThanOrEqual(CLIENTS);
  expect(acknowledged).toHaveLength(CLIENTS * SENDINGS);
  expect(batches.map((batch) => batch.number)).toEqual(batches.map((_, at) => at + 1));
  expect(batches.map((batch) => batch.act_id).sort()).toEqual(
    acknowledged.map(({ act }) => act).sort(),
  );
  expect(rows.map((row) => row.id).sort()).toEqual(acknowledged.flatMap(({ ids }) => ids).sort());
  for (const { act, answer } of acknowledged) expect(batches[answer.batch - 1]?.act_id).toBe(act);
  const documents = batches.map((batch) => JSON.parse(batch.document));
  expect(toHex(new Uint8Array(batches.at(-1)?.head ?? []))).toBe(
    toHex(chainHead(inspectionId, documents)),
  );
}, 120_000);
