import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { Actor } from '@/domain/access/permission';
import { readingsThatCount } from '@/domain/inspection/capture/readings-that-count';
import { assessFile } from '@/services/inspection/read/assess-file';
import { compareWithTablet } from '@/services/inspection/read/compare-with-tablet';
import { findSheetNow } from '@/services/inspection/read/sheet-now';
import {
  failureOf,
  fileOf,
  get,
  openInspection,
  openRaceNight,
  type RaceNight,
  rowsFor,
  send,
} from '../../support/bay';
import { addActor, openWorld, type World } from '../../support/world';

let world: World;
let night: RaceNight;
let other: Actor;
beforeAll(async () => {
  world = await openWorld();
  night = await openRaceNight(world);
  other = await addActor(world, 'Wim Aldergate', [{ seriesId: night.seriesId, role: 'inspector' }]);
});
afterAll(() => world.close());

const ask = (
  actor: Actor,
  inspectionId: string,
  bores: readonly string[] = [],
  set: string | null = null,
) => findSheetNow(world.ports(), actor, { inspectionId, bores, set });

describe('the sheet as it is now', () => {
  it('has every tablet’s rows, who took them, and how far the chain has come', async () => {
    const id = await openInspection(world, night, '41');
    const rows = rowsFor(world, night);
    const reading = rows.reading({});
    expect(get(await ask(night.inspector, id)).now).toMatchObject({ batch: 0, state: 'open' });
    get(await send(world, night.inspector, id, [reading]));
    get(await send(world, night.chief, id, [rows.reading({ axis: 'across' })]));
    const { now } = get(await ask(night.inspector, id));
    expect(now.batch).toBe(2);
    expect(now.rows.readings.map(({ takenBy }) => now.people[takenBy])).toEqual([
      'Oona Brannick',
      'Perrin Oakhollow',
    ]);
    get(await send(world, night.chief, id, [rows.strike(reading.id)]));
    const after = get(await ask(night.inspector, id)).now;
    expect(after.batch).toBe(3);
    const counting = readingsThatCount(after.rows.readings, after.rows.remarks);
    expect(counting.map(({ row }) => row.axis)).toEqual(['across']);
  });

  it('is given to whoever measures the car, and to nobody else', async () => {
    const id = await openInspection(world, night, '42');
    expect(get(await ask(night.chief, id)).now.batch).toBe(0);
    for (const actor of [other, night.official, night.competitor])
      expect(failureOf(await ask(actor, id)).name).toBe('absent');
    expect(failureOf(await ask(night.chief, world.ports().random.uuid())).name).toBe('absent');
  });

  it('for an independent set, it has nothing of the earlier ones at its bores', async () => {
    const id = await openInspection(world, night, '43');
    const rows = rowsFor(world, night);
    const at = (cylinder: string, more: object) =>
      rows.reading({ place: { bank: 'left', cylinder, valve: 'exhaust' }, ...more });
    const value = (text: string) => ({ value: { text, unit: 'in' } });
    get(
      await send(world, night.inspector, id, [
        at('1', value('0.8426')),
        at('3', value('0.8427')),
        at('5', value('0.8421')),
      ]),
    );
    const texts = async (bores: readonly string[], set: string | null) =>
      get(await ask(other, id, bores, set)).now.rows.readings.map((row) => row.value.text);
    expect(await texts(['1 exhaust'], null)).toEqual(['0.8427', '0.8421']);
    expect(await texts(['1 exhaust', '3 exhaust'], '2')).toEqual(['0.8421']);
    get(await send(world, other, id, [at('1', { set: 2, ...value('0.8425') })]));
    expect(await texts(['1 exhaust', '3 exhaust'], '2')).toEqual(['0.8421', '0.8425']);
    expect(await texts(['1 exhaust'], '3')).toEqual(['0.8427', '0.8421']);
    // No bore of this engine: no independent set, and so nothing for whoever is not named.
    expect(failureOf(await ask(other, id, ['9 sideways'])).name).toBe('absent');
  });
});

describe('what a tablet made of its rows', () => {
  it('is compared with the server’s only while nothing came after it', async () => {
    const id = await openInspection(world, night, '44');
    const rows = rowsFor(world, night);
    const tablet = { domainVersion: '1.2.0', states: { '4.2': 'outside' } };
    get(await send(world, night.inspector, id, [rows.reading({})], { tablet }));
    const compared = async () => {
      const file = await fileOf(world, night.chief, id);
      return compareWithTablet(world.ports().db, file.inspection, assessFile(file));
    };
    expect((await compared())?.differences).toEqual([
      { clause: '4.2', tablet: 'outside', server: 'not-measured' },
    ]);
    // A second set is sent without a word on the whole: its tablet has not seen the first.
    get(await send(world, night.chief, id, [rows.reading({ set: 2 })]));
    expect(await compared()).toBeUndefined();
  });
});
