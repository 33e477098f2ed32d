import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { Actor } from '@/domain/access/permission';
import { failure } from '@/domain/failure';
import { toHex } from '@/domain/ledger/bytes';
import { lineLeaf } from '@/domain/ledger/line';
import { frontierOf, rootOf } from '@/domain/ledger/tree';
import { fail, ok } from '@/domain/result';
import { Car } from '@/entities/paperwork/car';
import { type ActRequest, performAct } from '@/services/act/perform-act';
import { addActor, addSeries, openWorld, type World } from '../../support/world';

let world: World;
let seriesId: string;
let actor: Actor;

beforeAll(async () => {
  world = await openWorld();
  seriesId = await addSeries(world);
  actor = await addActor(world, 'Ilse Törnkvist', [{ seriesId, role: 'official' }]);
});
afterAll(() => world.close());

const request = (input: unknown, id = world.ports().random.uuid()): ActRequest => ({
  id,
  kind: 'test-act',
  seriesId,
  input,
});

/** Adds a car, queues a job and writes a ledger line. */
const act = (asked: ActRequest, name: string) => {
  const ports = world.ports();
  return performAct(ports, actor, asked, async ({ em, at, send, line }) => {
    const id = ports.random.uuid();
    em.persist(em.create(Car, { id, ownerId: actor.personId, name, createdAt: at }));
    send('sweep-uploads', { seriesId, fileId: id });
    line({
      seriesId,
      kind: 'cars-selected',
      contents: { cars: { text: `"${name}"`, open: true } },
    });
    return ok({ id });
  });
};

const count = async (sql: string, parameters: unknown[] = []) => {
  const [row] = await world.ports().db.execute<{ n: string }[]>(sql, parameters);
  return Number(row?.n);
};

describe('an act', () => {
  it('sent six times at once is done once, and every sender gets the same answer', async () => {
    const asked = request({ name: 'six' });
    const jobs = await count("select count(*) as n from jobs.job where name = 'sweep-uploads'");
    const answers = await Promise.all(Array.from({ length: 6 }, () => act(asked, 'six')));
    expect(new Set(answers.map((answer) => JSON.stringify(answer))).size).toBe(1);
    expect(answers[0]?.ok).toBe(true);
    expect(await count("select count(*) as n from public.car where name = 'six'")).toBe(1);
    expect(
      await count('select count(*) as n from record.ledger_line where act_id = ?', [asked.id]),
    ).toBe(1);
    expect(
      (await count("select count(*) as n from jobs.job where name = 'sweep-uploads'")) - jobs,
    ).toBe(1);
  });

  it('under a used id but with other content is refused', async () => {
    const asked = request({ name: 'first' });
    expect((await act(asked, 'first')).ok).toBe(true);
    const other = await act({ ...asked, input: { name: 'second' } }, 'second');
    expect(other).toMatchObject({ ok: false, failure: { name: 'same-id-other-content' } });
    expect(await count("select count(*) as n from public.car where name = 'second'")).toBe(0);
  });

  it('that fails leaves nothing behind and may be tried again under its id', async () => {
    const asked = request({ name: 'again' });
    const ports = world.ports();
    const refused = await performAct(ports, actor, asked, async ({ em, at, line }) => {
      const id = ports.random.uuid();
      em.persist(em.create(Car, { id, ownerId: actor.personId, name: 'again', createdAt: at }));
      line({ seriesId, kind: 'cars-selected', contents: {} });
      return fail(failure('not-in-this-state', 'Not now.'));
    });
    expect(refused).toMatchObject({ ok: false, failure: { name: 'not-in-this-state' } });
    expect(await count("select count(*) as n from public.car where name = 'again'")).toBe(0);
    expect((await act(asked, 'again')).ok).toBe(true);
  });

  it('whose ledger line cannot be written leaves no row and no job', async () => {
    const ports = world.ports();
    const asked = request({ name: 'broken' });
    const work = performAct(ports, actor, asked, async ({ em, at, send, line }) => {
      const id = ports.random.uuid();
      em.persist(em.create(Car, { id, ownerId: actor.personId, name: 'broken', createdAt: at }));
      send('sweep-uploads', { seriesId, fileId: id });
      line({ seriesId: ports.random.uuid(), kind: 'cars-selected', contents: {} });
      return ok(null);
    });
    await expect(work).rejects.toThrow(/has no ledger/);
    expect(await count("select count(*) as n from public.car where name = 'broken'")).toBe(0);
    expect(await count('select count(*) as n from record.act where id = ?', [asked.id])).toBe(0);
  });

  it('writes lines whose tree is the domain’s own, whoever wrote them at the same time', async () => {
    await Promise.all(Array.from({ length: 9 }, (_, i) => act(request({ i }), `tree ${i}`)));
    const { db } = world.ports();
    const lines = await db.execute<{ index: string; line: string; leaf_hash: Buffer }[]>(
      'select index, line, leaf_hash from record.ledger_line where series_id = ? order by index',
      [seriesId],
    );
    expect(lines.map((line) => Number(line.index))).toEqual(lines.map((_, i) => i));
    for (const { line, leaf_hash } of lines) {
      expect(leaf_hash.toString('hex')).toBe(toHex(lineLeaf(line)));
    }
    const nodes = await db.execute<{ level: number; index: string; hash: Buffer }[]>(
      'select level, index, hash from record.ledger_node where series_id = ?',
      [seriesId],
    );
    // Each kept node is the root of the leaves that it covers.
    for (const node of nodes) {
      const width = 2 ** node.level;
      const from = Number(node.index) * width;
      const leaves = lines.slice(from, from + width).map(({ line }) => lineLeaf(line));
      expect(leaves.length).toBe(width);
      expect(node.hash.toString('hex')).toBe(toHex(rootOf(frontierOf(leaves))));
    }
  });
});
