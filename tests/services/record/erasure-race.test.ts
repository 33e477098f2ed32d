import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { auditLedger } from '@/services/ledger/audit/audit-ledger';
import { eraseContent } from '@/services/ledger/erasure/erase-content';
import { removeObjects } from '@/services/ledger/erasure/remove-objects';
import { FakeObjects } from '../../support/fakes';
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
import { eventually } from '../../support/wait';
import { must } from '../rulebook/build';

interface Gate {
  /** Settled when somebody stands before it. */
  readonly reached: Promise<void>;
  open(): void;
  pass(): Promise<void>;
}

const gate = (): Gate => {
  let arrive = () => {};
  let open = () => {};
  const reached = new Promise<void>((resolve) => {
    arrive = resolve;
  });
  const opened = new Promise<void>((resolve) => {
    open = resolve;
  });
  return {
    reached,
    open: () => open(),
    pass: () => {
      arrive();
      return opened;
    },
  };
};

/** A store that stops one call until it is let through. */
class SlowObjects extends FakeObjects {
  before: Partial<Record<'remove' | 'findHead', Gate>> = {};
  readonly written: string[] = [];

  override async remove(key: string): Promise<void> {
    await this.before.remove?.pass();
    await super.remove(key);
  }
  override async findHead(key: string) {
    const found = await super.findHead(key);
    await this.before.findHead?.pass();
    return found;
  }
  override async write(key: string, bytes: Uint8Array, type: string): Promise<void> {
    this.written.push(key);
    await super.write(key, bytes, type);
  }
}

const objects = new SlowObjects();
let world: RecordWorld;
let paddock: Paddock;

beforeAll(async () => {
  world = await openRecordWorld();
  const opened = await openPaddock(world);
  paddock = { ...opened, objects, ports: () => ({ ...opened.ports(), objects }) };
});
afterAll(() => world.close());

const remove = () => removeObjects(paddock.ports(), { seriesId: paddock.seriesId });

/** A paperwork whose picture was erased from the record and waits to be removed from the store. */
const erased = async (carNumber: string, bytes: Uint8Array): Promise<void> => {
  const id = await start(paddock, carNumber);
  await keepPhotograph(paddock, id, bytes);
  await handIn(paddock, id, await save(paddock, id, 1, fullDraft()));
  const reason = 'The season’s retention time has passed.';
  const { seriesId } = paddock;
  const asked = { act: paddock.uuid(), seriesId, paperworkId: id, reason };
  must(await eraseContent(paddock.ports(), paddock.official, asked));
};

/** Somebody waits for the content's lock: who holds it has not been overtaken. */
const untilOneWaits = () =>
  eventually(
    'a session that waits for the content’s lock',
    async () => {
      const rows = await world.ports().db.execute<unknown[]>(
        `select 1 from pg_locks where locktype = 'advisory' and not granted
         and database = (select oid from pg_database where datname = current_database())`,
      );
      return rows[0];
    },
    10_000,
  );

const expectWhole = async (sha256: string) => {
  expect(objects.stored.has(`originals/${sha256}`)).toBe(true);
  const head = await signNow(paddock.ports(), paddock.seriesId);
  const asked = { seriesId: paddock.seriesId, heads: [head], keys: [] };
  expect((await auditLedger(paddock.ports(), asked)).faults).toEqual([]);
};

describe('the same picture handed in again while its erased copy is being removed', () => {
  it('is there afterwards: nothing of it is written until the removal went through', async () => {
    const bytes = await picture(411);
    await erased('41', bytes);
    const again = await start(paddock, '42');
    const removing = gate();
    objects.before = { remove: removing };
    objects.written.length = 0;
    const removed = remove();
    await removing.reached;
    const kept = keepPhotograph(paddock, again, bytes);
    await untilOneWaits();
    expect(objects.written).toEqual([]);
    removing.open();
    const [answer] = await Promise.all([kept, removed]);
    objects.before = {};
    if (answer.state !== 'kept') throw new Error(answer.state);
    expect(objects.written).toEqual([`originals/${answer.sha256}`]);
    await expectWhole(answer.sha256);
  });

  it('is not removed when its row is about to be seen', async () => {
    const bytes = await picture(412);
    await erased('43', bytes);
    const again = await start(paddock, '44');
    const looking = gate();
    objects.before = { findHead: looking };
    const kept = keepPhotograph(paddock, again, bytes);
    await looking.reached;
    const removed = remove();
    await untilOneWaits();
    looking.open();
    const [answer] = await Promise.all([kept, removed]);
    objects.before = {};
    if (answer.state !== 'kept') throw new Error(answer.state);
    await expectWhole(answer.sha256);
  });

  it('goes when nobody hands it in again', async () => {
    const bytes = await picture(413);
    await erased('45', bytes);
    const before = objects.stored.size;
    await remove();
    expect(objects.stored.size).toBe(before - 1);
  });
});
