import { afterAll, beforeAll, expect, it } from 'vitest';
import { remindDue } from '@/services/paperwork/remind-due';
import { handedIn, openPaddock, type Paddock, start } from '../../support/paperwork';
import { openWorld, type World } from '../../support/world';

let world: World;
let paddock: Paddock;

beforeAll(async () => {
  world = await openWorld();
  paddock = await openPaddock(world);
});
afterAll(() => world.close());

/** An event of the class's season with the competitor's car in it. */
const enter = async (startsAt: string, carNumber: string): Promise<void> => {
  const { seriesId, classId, competitor } = paddock;
  const { db } = world.ports();
  const eventId = paddock.uuid();
  await db.execute(
    `insert into public.event (series_id, id, season_id, number, slug, name, track, zone, starts_at, ends_at, protest_minutes)
     select c.series_id, ?, c.season_id, 7, 'round-7', 'Round 7', 'Quarrel Fen Oval', 'America/Chicago', ?, ?::timestamptz + interval '6 hours', 30
     from public.class c where c.series_id = ? and c.id = ?`,
    [eventId, startsAt, startsAt, seriesId, classId],
  );
  await db.execute(
    `insert into public.entry (series_id, id, event_id, class_id, car_number, competitor_id, competitor_name)
     values (?, ?, ?, ?, ?, ?, 'Ada Lindqvist')`,
    [seriesId, paddock.uuid(), eventId, classId, carNumber, competitor.personId],
  );
};

const reminders = () =>
  world.ports().db.execute<{ subject: string; words: string; path: string }[]>(
    `select subject, content ->> 'next' as words, content #>> '{link,path}' as path
       from public.mail where kind = 'due-soon' order by created_at`,
  );

it('a day before the event, whoever has not handed in is reminded once', async () => {
  const open = await start(paddock, '41');
  await handedIn(paddock, '42');
  await enter('2026-07-14T23:00:00Z', '41');
  world.clock.set('2026-07-13T22:00:00.000Z');
  await remindDue(world.ports());
  expect(await reminders()).toEqual([]);
  world.clock.set('2026-07-13T23:30:00.000Z');
  await remindDue(world.ports());
  world.clock.set('2026-07-14T20:30:00.000Z');
  await remindDue(world.ports());
  expect(await reminders()).toEqual([
    {
      subject: expect.stringMatching(/^Due soon: paperwork for car 41, /),
      words: 'fill in what is missing and hand it in.',
      path: `/paddock/paperwork/${open}`,
    },
  ]);
  world.clock.set('2026-07-14T23:30:00.000Z');
  await remindDue(world.ports());
  expect((await reminders()).length).toBe(1);
});
