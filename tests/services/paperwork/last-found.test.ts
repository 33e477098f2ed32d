import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { Actor } from '@/domain/access/permission';
import { findLastFound } from '@/services/paperwork/read/find-last-found';
import { BIG_FEET, BREACH, NO_BREACH, V8 } from '../../support/verdict-case';
import { openVerdictWorld, type VerdictWorld } from '../../support/verdict-world';
import { addActor, openWorld, type World } from '../../support/world';

let world: World;
let v: VerdictWorld;
let engineId: string;
let other: Actor;

const run = (sql: string, values: readonly unknown[]) => world.ports().db.execute(sql, [...values]);

/** An inspection that rests on paperwork of the engine. */
const inspect = async (car: string): Promise<string> => {
  const inspection = await v.addInspection(car);
  const paperworkId = world.ports().random.uuid();
  await run(
    `insert into public.paperwork (series_id, id, class_id, competitor_id, engine_id, car_number, draft, updated_by, updated_at)
     select e.series_id, ?, e.class_id, e.competitor_id, ?, e.car_number, '{}', e.competitor_id, now()
     from public.entry e join public.inspection i on i.series_id = e.series_id and i.entry_id = e.id
     where i.series_id = ? and i.id = ?`,
    [paperworkId, engineId, v.seriesId, inspection],
  );
  await run('update public.inspection set paperwork_id = ? where series_id = ? and id = ?', [
    paperworkId,
    v.seriesId,
    inspection,
  ]);
  return inspection;
};

beforeAll(async () => {
  world = await openWorld();
  v = await openVerdictWorld(world);
  engineId = world.ports().random.uuid();
  await run(
    'insert into public.engine (id, owner_id, reference, layout, created_at) values (?, ?, ?, ?, now())',
    [engineId, v.competitor.personId, 'VR-2231', JSON.stringify(V8)],
  );
  other = await addActor(world, 'Other Entrant', [{ seriesId: v.seriesId, role: 'competitor' }]);
});
afterAll(() => world.close());

const find = (actor: Actor) => findLastFound(world.ports(), actor, engineId);

describe('what the last teardown of an engine found', () => {
  it('is nothing before a verdict is published, though the report is signed', async () => {
    const inspection = await inspect('12J');
    expect(await find(v.competitor)).toBeUndefined();
    await v.sign(inspection, BIG_FEET);
    expect(await find(v.competitor)).toBeUndefined();
    const done = await v.decide(inspection, BREACH);
    expect(done.ok).toBe(true);
    const last = await find(v.competitor);
    expect(last).toMatchObject({ event: 'event 7, Quarrel Fen Oval' });
    const loose = last?.found.find(
      ({ quantity, position }) => quantity === 'tappet-clearance' && position === '7 intake',
    );
    expect(loose?.value).toEqual({ text: '0.0024', unit: 'in' });
  });

  it('is the later one where there were two', async () => {
    const before = await find(v.competitor);
    const inspection = await inspect('13J');
    await v.sign(inspection);
    expect((await v.decide(inspection, NO_BREACH)).ok).toBe(true);
    const after = await find(v.competitor);
    expect(after?.number).not.toBe(before?.number);
    const same = after?.found.find(
      ({ quantity, position }) => quantity === 'tappet-clearance' && position === '7 intake',
    );
    expect(same?.value).toEqual({ text: '0.0016', unit: 'in' });
  });

  it('is not for others, and no other engine’s', async () => {
    expect(await find(other)).toBeUndefined();
    expect(await find(v.official)).toBeUndefined();
    expect(
      await findLastFound(world.ports(), v.competitor, world.ports().random.uuid()),
    ).toBeUndefined();
  });
});
