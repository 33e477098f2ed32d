import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { readMoment } from '@/contracts/rulebook/moment';
import type { BulletinContent } from '@/contracts/rulebook/read-rulebook';
import { toHex } from '@/domain/ledger/bytes';
import { listBulletins } from '@/services/public/find-series-head';
import { findRules } from '@/services/rulebook/find-rules';
import { grantWaiver } from '@/services/rulebook/ruling/grant-waiver';
import { publishClarification } from '@/services/rulebook/ruling/publish-clarification';
import { openWorld, type World } from '../../support/world';
import {
  bulletinOf,
  clauseOf,
  must,
  type Office,
  openOffice,
  publish,
  publishTyped,
  putInForce,
  typeBulletin,
} from './build';

let world: World;
beforeAll(async () => {
  world = await openWorld();
});
afterAll(() => world.close());

const ZONE = 'America/Chicago';
const rulesAt = (office: Office, at: number) =>
  findRules(world.ports().db, office.seriesId, office.classId, new Date(at));
const wordsAt = async (office: Office, at: number, clause = '4.4') =>
  (await rulesAt(office, at))?.rules.clauses.find((one) => one.number === clause)?.words;

describe('the rules in force', () => {
  it.each([
    ['midnight in the zone', '2026-08-01', '2026-08-01T05:00:00.000Z'],
    ['midnight after clocks went forward', '2027-03-15', '2027-03-15T05:00:00.000Z'],
    ['midnight before clocks go forward', '2027-03-14', '2027-03-14T06:00:00.000Z'],
    ['an hour that is skipped', '2027-03-14T02:30', '2027-03-14T08:30:00.000Z'],
    ['an hour that comes twice', '2026-11-01T01:30', '2026-11-01T07:30:00.000Z'],
  ])('change at the millisecond: %s', async (_name, written, utc) => {
    world.clock.set('2026-07-11T20:00:00.000Z');
    const office = await openOffice(world);
    await putInForce(world, office);
    const at = readMoment(written, ZONE);
    expect(at?.toISOString()).toBe(utc);
    const change = bulletinOf(clauseOf('4.4', { words: 'Bores are as cast.' }), {
      kind: 'instant',
      at: utc,
    });
    expect(must(await publish(world, office, change)).number).toBe(1);
    const boundary = Date.parse(utc);
    expect(await wordsAt(office, boundary - 1)).toBe('Lifter bores are not bushed.');
    expect(await wordsAt(office, boundary)).toBe('Bores are as cast.');
  });

  it('begin with the first edition, at its instant', async () => {
    world.clock.set('2026-07-11T20:00:00.000Z');
    const office = await openOffice(world);
    await putInForce(world, office, '2026-07-12T05:00:00.000Z');
    const from = Date.parse('2026-07-12T05:00:00.000Z');
    expect(await rulesAt(office, from - 1)).toBeUndefined();
    expect((await rulesAt(office, from))?.rules.edition).toBe(1);
  });

  it('have one hash, whatever order the bulletins were typed in', async () => {
    world.clock.set('2026-07-11T20:00:00.000Z');
    const one = bulletinOf(clauseOf('4.4', { words: 'Bores are as cast.' }), { kind: 'safety' });
    const two = bulletinOf(clauseOf('4.2', { heading: 'Size of body' }), { kind: 'safety' });
    const hashes = [];
    for (const typed of [
      [one, two],
      [two, one],
    ]) {
      const office = await openOffice(world);
      await putInForce(world, office);
      const drafts = new Map<BulletinContent, string>();
      for (const content of typed) drafts.set(content, await typeBulletin(world, office, content));
      for (const content of [one, two]) {
        must(await publishTyped(world, office, drafts.get(content) ?? ''));
      }
      const standing = await rulesAt(office, world.clock.now().getTime());
      expect(standing?.rules.bulletins).toEqual([1, 2]);
      hashes.push(standing && toHex(standing.hash));
    }
    expect(hashes[0]).toBe(hashes[1]);
  });

  it('have the same hash when asked on another day, and another after every ruling', async () => {
    world.clock.set('2026-07-11T20:00:00.000Z');
    const office = await openOffice(world);
    const { seriesId, classId, official } = office;
    await putInForce(world, office);
    const hash = async () => {
      const standing = await rulesAt(office, world.clock.now().getTime());
      return standing && toHex(standing.hash);
    };
    const first = await hash();
    world.clock.advance(86_400_000);
    expect(await hash()).toBe(first);
    const ports = world.ports();
    const ids = () => ({ act: ports.random.uuid(), id: ports.random.uuid() });
    must(
      await publishClarification(ports, official, {
        ...ids(),
        seriesId,
        classId,
        clause: '4.4',
        question: 'Is a sleeve a bush?',
        answer: 'Yes.',
      }),
    );
    const clarified = await hash();
    expect(clarified).not.toBe(first);
    must(
      await grantWaiver(world.ports(), official, {
        ...ids(),
        seriesId,
        classId,
        clause: '4.4',
        for: { kind: 'car', carNumber: '12J' },
        words: 'One bushed bore is allowed.',
        reason: 'A repair before the rule.',
        fromAt: '2026-07-13T05:00:00.000Z',
        untilAt: '2026-07-20T05:00:00.000Z',
      }),
    );
    expect(await hash()).toBe(clarified);
    world.clock.set('2026-07-13T05:00:00.000Z');
    expect(await hash()).not.toBe(clarified);
    world.clock.set('2026-07-20T04:59:59.999Z');
    expect((await rulesAt(office, world.clock.now().getTime()))?.rules.waivers).toHaveLength(1);
    world.clock.set('2026-07-20T05:00:00.000Z');
    expect(await hash()).toBe(clarified);
  });

  it('take a bulletin for the next event at the start of that event', async () => {
    world.clock.set('2026-07-11T20:00:00.000Z');
    const office = await openOffice(world);
    await putInForce(world, office);
    const change = bulletinOf(clauseOf('4.4', { words: 'Bores are as cast.' }), {
      kind: 'next-event',
    });
    must(await publish(world, office, change));
    const start = Date.parse('2026-07-18T23:00:00.000Z');
    expect(await wordsAt(office, start)).toBe('Lifter bores are not bushed.');
    const onTheBoard = async () => {
      const listed = await listBulletins(world.ports(), office.seriesId);
      return listed.find(({ kind }) => kind === 'bulletin')?.inForceAt;
    };
    expect(await onTheBoard()).toBeNull();
    await world.ports().db.execute(
      `insert into public.event (series_id, id, season_id, number, slug, name, track, zone, starts_at, ends_at, protest_minutes)
         values (?, ?, ?, 1, 'one', 'One', 'Quarrel Fen Oval', ?, ?, ?, 30)`,
      [
        office.seriesId,
        world.ports().random.uuid(),
        office.seasonId,
        ZONE,
        new Date(start),
        new Date(start),
      ],
    );
    expect(await wordsAt(office, start - 1)).toBe('Lifter bores are not bushed.');
    expect(await wordsAt(office, start)).toBe('Bores are as cast.');
    expect(await onTheBoard()).toBe(new Date(start).toISOString());
  });
});
