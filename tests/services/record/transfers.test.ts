import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { openDatabase } from '@/adapters/database/orm';
import { parseLine } from '@/domain/ledger/line';
import { auditLedger } from '@/services/ledger/audit/audit-ledger';
import { HeldByALedger } from '../../../migrations/0025-held-by-a-ledger';
import { connect } from '../../../scripts/postgres/roles.mjs';
import { get } from '../../support/bay';
import { handedIn, openPaddock, type Paddock } from '../../support/paperwork';
import { openRecordWorld, type RecordWorld, signNow } from '../../support/record';
import { recordThePaddock } from '../../support/record-of-a-paddock';

let world: RecordWorld;
let paddock: Paddock;
let another: Paddock;
let write: ReturnType<typeof recordThePaddock>;

beforeAll(async () => {
  world = await openRecordWorld();
  paddock = await openPaddock(world);
  another = await openPaddock(world);
  write = recordThePaddock(paddock);
});
afterAll(() => world.close());

/** Series in whose ledger a change of hands of the engine stands, by line. */
const ledgersOf = async (engineId: string): Promise<readonly string[]> => {
  const rows = await world.ports().db.execute<{ line: string }[]>(
    `select line from record.ledger_line where kind = 'engine-transferred'
       and line::jsonb #>> '{refs,engine}' = ? order by series_id, index`,
    [engineId],
  );
  return rows.map(({ line }) => get(parseLine(line)).series);
};

const faults = async (one: Paddock) => {
  const { seriesId } = one;
  const asked = { seriesId, heads: [await signNow(world.ports(), seriesId)], keys: [] };
  return (await auditLedger(one.ports(), asked)).faults;
};

describe('an engine that changes hands', () => {
  it('stands in the ledger of the series that has its paperwork, and of no other', async () => {
    await handedIn(paddock, '12J');
    await write.sell(paddock.engineId, 'Bought 1');
    expect(await ledgersOf(paddock.engineId)).toEqual([paddock.seriesId]);
  });

  it('stands in the ledgers of the series where the two race, if none has paperwork of it yet', async () => {
    const engineId = await write.undeclared();
    await write.sell(engineId, 'Bought 2');
    expect(await ledgersOf(engineId)).toEqual([paddock.seriesId]);
    for (const one of [paddock, another]) expect(await faults(one)).toEqual([]);
  });
});

describe('changes of hands of before', () => {
  const enter = async (engineId: string, until: string | null) => {
    const superuser = await connect(world.database.superuserUrl);
    const [act, id] = [paddock.uuid(), paddock.uuid()];
    const { competitor, rival } = paddock;
    await superuser.query(
      `insert into record.act (id, kind, request_hash, answer)
       values ($1, 'accept-engine-offer', sha256('x'), '{"value":null}')`,
      [act],
    );
    await superuser.query(
      `insert into record.engine_transfer (id, engine_id, kind, from_id, to_id, until_at, act_id)
       values ($1, $2, $3, $4, $5, $6, $7)`,
      [
        id,
        engineId,
        until === null ? 'sold' : 'lent',
        competitor.personId,
        rival.personId,
        until,
        act,
      ],
    );
    await superuser.end();
  };

  it('are named while no ledger holds them, and get their lines from the migration', async () => {
    const [sold, lent] = [await write.undeclared(), another.engineId];
    await handedIn(another, '7');
    await enter(sold, null);
    await enter(lent, '2026-08-01T00:00:00.000Z');
    for (const one of [paddock, another])
      expect((await faults(one)).map(({ where }) => where)).toEqual([
        'record.engine_transfer',
        'record.engine_transfer',
      ]);

    const orm = await openDatabase(world.database.superuserUrl, 1);
    try {
      const migration = new HeldByALedger(orm.em.getDriver(), orm.config);
      migration.up();
      const hold = String(migration.getQueries().at(-1));
      expect(hold).toContain('engine-transferred');
      for (let time = 0; time < 2; time += 1) await orm.em.fork().execute(hold);
    } finally {
      await orm.close();
    }
    expect(await ledgersOf(sold)).toEqual([paddock.seriesId]);
    expect(await ledgersOf(lent)).toEqual([another.seriesId]);
    for (const one of [paddock, another]) expect(await faults(one)).toEqual([]);
  });
});
