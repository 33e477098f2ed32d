import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { Actor } from '@/domain/access/permission';
import { Inspection } from '@/entities/event/inspection';
import { assignInspector } from '@/services/inspection/assign-inspector';
import { changeState } from '@/services/inspection/change-state';
import { handOverInspection } from '@/services/inspection/hand-over-inspection';
import { listInspectors } from '@/services/inspection/list-inspectors';
import { findInspection } from '@/services/inspection/read/find-inspection';
import { readHistory } from '@/services/inspection/read/history';
import { declareInterest } from '@/services/interest/declare-interest';
import { endInterest } from '@/services/interest/end-interest';
import { failureOf, get, openInspection, openRaceNight, type RaceNight } from '../../support/bay';
import { addActor, openWorld, type World } from '../../support/world';

let world: World;
let night: RaceNight;
let second: Actor;
beforeAll(async () => {
  world = await openWorld();
  night = await openRaceNight(world);
  second = await addActor(world, 'Marit Quell', [{ seriesId: night.seriesId, role: 'inspector' }]);
});
afterAll(() => world.close());

const uuid = () => world.ports().random.uuid();
const rowOf = (id: string) => world.ports().db.findOneOrFail(Inspection, { id });
const assign = async (inspectionId: string, to: Actor, by = night.chief) =>
  assignInspector(world.ports(), by, {
    act: uuid(),
    inspectionId,
    inspectorId: to.personId,
    bay: '3',
    version: (await rowOf(inspectionId)).version,
  });
const declare = (
  about: { competitorId?: string; carNumber?: string },
  kind: 'team' | 'builder' | 'relation' | 'other',
  by = second,
  of = second,
) =>
  declareInterest(world.ports(), by, {
    act: uuid(),
    seriesId: night.seriesId,
    id: uuid(),
    personId: of.personId,
    kind,
    competitorId: about.competitorId ?? null,
    carNumber: about.carNumber ?? null,
    words: '',
  });
const end = (id: string, by = night.chief) =>
  endInterest(world.ports(), by, { act: uuid(), seriesId: night.seriesId, id });

describe('who inspects', () => {
  it.each([
    ['team', 'is of this competitor’s team'],
    ['builder', 'builds this competitor’s engines'],
    ['relation', 'is related to this competitor'],
    ['other', 'has declared an interest'],
  ] as const)('refuses a declared %s, by car number, and says who is free', async (kind, words) => {
    const id = await openInspection(world, night, `6${kind.length}`, false);
    const { id: interest } = get(await declare({ carNumber: `6${kind.length}` }, kind));
    const refused = failureOf(await assign(id, second));
    expect(refused.name).toBe('conflict-of-interest');
    expect(refused.detail).toContain(`Marit Quell ${words}`);
    expect(refused.detail).toMatch(/Free: .*Oona Brannick/);
    expect(refused.detail).not.toMatch(/Free:.*Marit Quell/);
    expect((await rowOf(id)).inspectorId).toBe(night.inspector.personId);
    get(await end(interest));
    get(await assign(id, second));
  });

  it('refuses who is tied to the competitor as a person, whatever the car’s number', async () => {
    const competitor = await addActor(world, 'Bram Oxley', [
      { seriesId: night.seriesId, role: 'competitor' },
    ]);
    const id = await openInspection(world, night, '70', false);
    await world
      .ports()
      .db.execute('update public.entry set competitor_id = ? where car_number = ?', [
        competitor.personId,
        '70',
      ]);
    const { id: interest } = get(await declare({ competitorId: competitor.personId }, 'relation'));
    expect(failureOf(await assign(id, second)).name).toBe('conflict-of-interest');
    get(await end(interest));
  });

  it('refuses who runs in the class themselves, and who has an engine declared in it', async () => {
    const racer = await addActor(world, 'Nell Harrow', [
      { seriesId: night.seriesId, role: 'inspector' },
      { seriesId: night.seriesId, role: 'competitor' },
    ]);
    const id = await openInspection(world, night, '71', false);
    get(await assign(id, racer));
    await openInspection(world, night, '72', false);
    await world
      .ports()
      .db.execute('update public.entry set competitor_id = ? where car_number = ?', [
        racer.personId,
        '72',
      ]);
    const [offered] = (await listInspectors(world.ports(), await rowOf(id))).filter(
      (person) => person.id === racer.personId,
    );
    expect(offered?.interest).toBe('runs in this class at this event');
    const open = { act: uuid(), inspectionId: id, to: 'open', reason: '' } as const;
    expect(failureOf(await changeState(world.ports(), racer, open)).name).toBe(
      'conflict-of-interest',
    );
  });

  it('lets everybody declare their own, nobody clear themselves, and a rival nothing', async () => {
    expect(failureOf(await declare({ carNumber: '9' }, 'team', second, night.inspector)).name).toBe(
      'absent',
    );
    expect(
      failureOf(await declare({ carNumber: '9' }, 'team', night.competitor, second)).name,
    ).toBe('absent');
    expect(failureOf(await declare({}, 'team')).name).toBe('invalid');
    const { id } = get(await declare({ carNumber: '9' }, 'team', night.chief, night.chief));
    expect(failureOf(await end(id)).name).toBe('conflict-of-interest');
    expect(failureOf(await end(id, second)).name).toBe('absent');
    get(await end(id, night.official));
    const lines = await world.ports().db.execute<{ n: number }[]>(
      `select count(*)::int as n from record.ledger_content c join record.ledger_line l
           on l.series_id = c.series_id and l.index = c.line_index
         where l.kind = 'interest-declared' and c.open`,
    );
    expect(lines[0]?.n).toBe(0);
  });
});

describe('one inspection through the night and Monday', () => {
  it('is handed over with a reason, by who has it, the chief or an official only', async () => {
    const id = await openInspection(world, night, '80');
    const other = await addActor(world, 'Third Inspector', [
      { seriesId: night.seriesId, role: 'inspector' },
    ]);
    const hand = (by: Actor, to: Actor, reason = 'Called to bay 1') =>
      handOverInspection(world.ports(), by, {
        act: uuid(),
        inspectionId: id,
        inspectorId: to.personId,
        reason,
      });
    expect(failureOf(await hand(other, other)).name).toBe('absent');
    expect(failureOf(await hand(night.inspector, second, ' ')).faults?.[0]?.pointer).toBe(
      '/handOverReason',
    );
    expect(failureOf(await assign(id, second)).detail).toContain('Hand it over');
    get(await hand(night.inspector, second));
    expect((await rowOf(id)).inspectorId).toBe(second.personId);
    expect(failureOf(await hand(night.inspector, night.inspector)).name).toBe('absent');
    get(await hand(night.official, night.inspector, 'Back'));
  });

  it('keeps place, bag, seals and words of each act in its history', async () => {
    const id = await openInspection(world, night, '81');
    const act = (
      by: Actor,
      to: 'stop' | 'resume' | 'refuse',
      more: { reason: string; place?: string; seals?: string; bag?: string },
    ) => changeState(world.ports(), by, { act: uuid(), inspectionId: id, to, ...more });
    get(
      await act(night.inspector, 'stop', {
        reason: 'Curfew at 23:00',
        place: 'Locked store, Quarrel Fen',
        seals: '4471, 4472',
        bag: 'B-12',
      }),
    );
    expect(await rowOf(id)).toMatchObject({ state: 'stopped', place: 'Locked store, Quarrel Fen' });
    world.clock.set('2026-07-13T15:00:00.000Z');
    get(
      await act(night.inspector, 'resume', {
        reason: 'Opened before Tamsin Overley',
        place: 'Workshop of the series, Alder Row',
        seals: '4471, 4472 unbroken',
        bag: 'B-12',
      }),
    );
    const found = get(await findInspection(world.ports(), night.inspector, id));
    expect(found.inspection).toMatchObject({
      state: 'open',
      place: 'Workshop of the series, Alder Row',
    });
    const history = await readHistory(world.ports(), found.inspection);
    expect(history.map(({ change }) => change)).toEqual(['assign', 'open', 'stop', 'resume']);
    expect(history[0]).toMatchObject({ inspector: 'Oona Brannick', inspectorBefore: null });
    expect(history[2]).toMatchObject({
      reason: 'Curfew at 23:00',
      place: 'Locked store, Quarrel Fen',
      seals: '4471, 4472',
      bag: 'B-12',
      by: 'Oona Brannick',
    });
    expect(history[3]?.at).toBe('2026-07-13T15:00:00.000Z');
    expect(history[3]).toMatchObject({ seals: '4471, 4472 unbroken' });
  });
});
