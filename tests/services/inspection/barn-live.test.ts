import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { openBarnFeed } from '@/adapters/database/barn-news';
import { changeState } from '@/services/inspection/change-state';
import { followBarn } from '@/services/inspection/live/follow-barn';
import type { BarnHears } from '@/services/ports';
import { connect } from '../../../scripts/postgres/roles.mjs';
import {
  failureOf,
  get,
  openInspection,
  openRaceNight,
  type RaceNight,
  rowsFor,
  send,
} from '../../support/bay';
import { eventually } from '../../support/wait';
import { addActor, addSeries, openWorld, type World } from '../../support/world';

let world: World;
let night: RaceNight;
/** Two server processes' feeds. */
let feeds: ReturnType<typeof openBarnFeed>[];
beforeAll(async () => {
  world = await openWorld();
  night = await openRaceNight(world);
  feeds = [0, 1].map(() => openBarnFeed(world.database.appUrl, () => undefined));
});
afterAll(async () => {
  await Promise.all(feeds.map((feed) => feed.close()));
  await world.close();
});

const follow = async (at = 0, seriesId = night.seriesId) => {
  const heard: BarnHears[] = [];
  const barn = feeds[at];
  if (barn === undefined) throw new Error('No such feed.');
  const followed = get(
    await followBarn(world.ports({ barn }), night.inspector, {
      seriesId,
      hear: (news) => heard.push(news),
    }),
  );
  return { heard, ...followed };
};

describe('the barn’s tablets', () => {
  it('hear of an act in every process once it is committed: ids and state, no name and no value', async () => {
    const id = await openInspection(world, night, '51', false);
    const [here, there] = [await follow(0), await follow(1)];
    get(
      await changeState(world.ports(), night.inspector, {
        act: world.ports().random.uuid(),
        inspectionId: id,
        to: 'open',
        reason: 'Said in confidence',
      }),
    );
    get(await send(world, night.inspector, id, rowsFor(world, night).fullBore('5')));
    for (const { heard } of [here, there])
      await eventually('both acts', async () => (heard.length >= 2 ? true : undefined));
    expect(there.heard).toEqual(here.heard);
    expect(here.heard[0]).toEqual({
      kind: 'inspection',
      series: night.seriesId,
      inspection: id,
      state: 'open',
      version: 3,
    });
    expect(here.heard[1]).toEqual({
      kind: 'readings',
      series: night.seriesId,
      inspection: id,
      batch: 1,
      by: night.inspector.personId,
      places: ['5 exhaust'],
    });
    expect(JSON.stringify(here.heard)).not.toMatch(/confidence|0\.84|Brannick/);
    here.leave();
    there.leave();
  });

  it('hear nothing of an act that was refused or undone', async () => {
    const id = await openInspection(world, night, '52');
    const { heard, leave, mark, readMark } = await follow();
    const refused = await changeState(world.ports(), night.inspector, {
      act: world.ports().random.uuid(),
      inspectionId: id,
      to: 'stop',
      reason: '',
    });
    expect(failureOf(refused).name).toBe('invalid');
    expect(await readMark()).toBe(mark);
    get(await send(world, night.inspector, id, rowsFor(world, night).fullBore('7')));
    await eventually('the next act', async () =>
      heard.some((news) => typeof news !== 'string' && news.kind === 'readings') ? true : undefined,
    );
    expect(JSON.stringify(heard)).not.toContain('stopped');
    expect(await readMark()).not.toBe(mark);
    leave();
  });

  it('hear of their own series alone, and a stranger hears nothing', async () => {
    const other = await addSeries(world, 'far-mere');
    const { heard, leave } = await follow();
    world.clock.set('2026-07-11T20:00:00.000Z');
    const elsewhere = await openRaceNight(world, 'long-acre');
    await openInspection(world, elsewhere, '1');
    const id = await openInspection(world, night, '53');
    await eventually('one’s own', async () => (heard.length > 0 ? true : undefined));
    expect(heard.every((news) => typeof news !== 'string' && news.series === night.seriesId)).toBe(
      true,
    );
    expect(
      heard.some(
        (news) => typeof news !== 'string' && 'inspection' in news && news.inspection === id,
      ),
    ).toBe(true);
    leave();
    const stranger = await addActor(world, 'A Stranger', [{ seriesId: other, role: 'inspector' }]);
    const barn = feeds[0];
    const asked = { seriesId: night.seriesId, hear: () => undefined };
    if (barn === undefined) throw new Error('No feed.');
    for (const actor of [stranger, night.competitor])
      expect(failureOf(await followBarn(world.ports({ barn }), actor, asked)).name).toBe('absent');
  });

  it('are told that something may have been missed when the connection was lost, and hear on', async () => {
    const { heard, leave } = await follow();
    const superuser = await connect(world.database.superuserUrl);
    await superuser.query(
      "select pg_terminate_backend(pid) from pg_stat_activity where application_name = 'tagwire-barn' and datname = current_database()",
    );
    await superuser.end();
    await eventually('the word', async () => (heard.includes('missed') ? true : undefined));
    const before = heard.length;
    await openInspection(world, night, '54');
    await eventually('an act after it', async () => (heard.length > before ? true : undefined));
    leave();
  });

  it('are told of the end when the server stops', async () => {
    const barn = openBarnFeed(world.database.appUrl, () => undefined);
    const heard: BarnHears[] = [];
    get(
      await followBarn(world.ports({ barn }), night.inspector, {
        seriesId: night.seriesId,
        hear: (news) => heard.push(news),
      }),
    );
    await barn.close();
    expect(heard).toEqual(['closing']);
    const after = await followBarn(world.ports({ barn }), night.inspector, {
      seriesId: night.seriesId,
      hear: () => undefined,
    });
    expect(failureOf(after).name).toBe('unavailable');
  });
});
