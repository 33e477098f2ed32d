import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { toHex } from '@/domain/ledger/bytes';
import { enterCars } from '@/services/event/enter-cars';
import { findEvent } from '@/services/event/find-event';
import { pickCars } from '@/services/event/pick-cars';
import { writePositions } from '@/services/event/write-positions';
import { findRules } from '@/services/rulebook/find-rules';
import { failureOf, get, openRaceNight, type RaceNight } from '../../support/bay';
import { addActor, openWorld, type World } from '../../support/world';

let world: World;
let night: RaceNight;
beforeAll(async () => {
  world = await openWorld();
  night = await openRaceNight(world);
});
afterAll(() => world.close());

const uuid = () => world.ports().random.uuid();
const row = (carNumber: string, more = {}) => ({
  id: uuid(),
  classId: night.classId,
  carNumber,
  competitorName: `Competitor ${carNumber}`,
  engineReference: '',
  position: null,
  ...more,
});
const enter = (entries: ReturnType<typeof row>[], actor = night.official) =>
  enterCars(world.ports(), actor, {
    act: uuid(),
    seriesId: night.seriesId,
    eventId: night.eventId,
    entries,
  });
const sheet = async () => get(await findEvent(world.ports(), night.official, night.eventId));

describe('entries', () => {
  it('are added, changed by class and number, and refused whole when one conflicts', async () => {
    get(await enter([row('12J', { position: 1 }), row('8')]));
    get(await enter([row('8', { competitorName: 'competitor 8', position: 2 })]));
    const refused = failureOf(await enter([row('9'), row('12J', { competitorName: 'Other' })]));
    expect(refused.faults).toEqual([
      { pointer: '/entries/1/competitorName', detail: 'Car 12J is entered by Competitor 12J.' },
    ]);
    const { entries, event } = await sheet();
    expect(entries.map(({ carNumber, position }) => [carNumber, position])).toEqual([
      ['12J', 1],
      ['8', 2],
    ]);
    expect(event.resultsState).toBe('unofficial');
  });

  it('cannot share a position; two may change places in one act', async () => {
    const { entries } = await sheet();
    const [first, second] = entries;
    const write = (a: number | null, b: number | null) =>
      writePositions(world.ports(), night.official, {
        act: uuid(),
        seriesId: night.seriesId,
        eventId: night.eventId,
        positions: [
          { entryId: first?.id ?? '', position: a, state: 'entered' },
          { entryId: second?.id ?? '', position: b, state: 'entered' },
        ],
      });
    expect(failureOf(await write(1, 1)).faults?.[0]?.pointer).toBe('/positions/1/position');
    get(await write(2, 1));
    expect((await sheet()).entries.map((entry) => entry.carNumber)).toEqual(['8', '12J']);
  });

  it('are the officials’ alone', async () => {
    for (const actor of [night.chief, night.inspector, night.competitor]) {
      expect(failureOf(await enter([row('77')], actor)).name).toBe('absent');
      expect(failureOf(await findEvent(world.ports(), actor, night.eventId)).name).toBe('absent');
    }
  });
});

describe('picks', () => {
  const pick = async (carNumber: string, because: 'position' | 'nominated', words = '') => {
    const { entries } = await sheet();
    const entryId = entries.find((entry) => entry.carNumber === carNumber)?.id ?? '';
    return pickCars(world.ports(), night.official, {
      act: uuid(),
      seriesId: night.seriesId,
      eventId: night.eventId,
      picks: [{ inspectionId: uuid(), entryId, because, words }],
    });
  };

  it('make an inspection each, pinned to the rules in force at the event’s start', async () => {
    const [id] = get(await pick('8', 'position')).inspections;
    const { db } = world.ports();
    const rules = await findRules(
      db,
      night.seriesId,
      night.classId,
      new Date('2026-07-11T23:00:00.000Z'),
    );
    const [found] = await db.execute<{ hash: string; banks: number }[]>(
      `select encode(rules_hash, 'hex') as hash, jsonb_array_length(layout -> 'banks') as banks
       from public.inspection where id = ?`,
      [id],
    );
    expect(found).toEqual({ hash: toHex(rules?.hash ?? new Uint8Array()), banks: 2 });
    const [line] = await db.execute<{ role: string; content: string }[]>(
      `select c.role, c.content from record.ledger_content c join record.ledger_line l
       on l.series_id = c.series_id and l.index = c.line_index
       where l.kind = 'cars-selected' and c.open order by c.line_index desc limit 1`,
    );
    expect(JSON.parse(line?.content ?? '').picks).toEqual([
      { inspection: id, car: '8', because: 'position', rules: found?.hash },
    ]);
  });

  it('take no car twice, and keep a nomination’s words from the public', async () => {
    expect(failureOf(await pick('8', 'position')).faults?.[0]?.detail).toMatch(
      /^Car 8 is picked already: by finishing position, by Ilse Törnkvist, /,
    );
    get(await pick('12J', 'nominated', 'Unusual noise, reported by a rival'));
    const open = await world
      .ports()
      .db.execute<{ n: string }[]>(
        `select count(*) as n from record.ledger_content where open and content like '%rival%'`,
      );
    expect(open[0]?.n).toBe('0');
  });

  it('by two officials at once: one picks, the other is told what the first did', async () => {
    get(await enter([row('31')]));
    const second = await addActor(world, 'Second Official', [
      { seriesId: night.seriesId, role: 'official' },
    ]);
    const { entries } = await sheet();
    const entryId = entries.find((entry) => entry.carNumber === '31')?.id ?? '';
    const answers = await Promise.all(
      [night.official, second].flatMap((actor) =>
        Array.from({ length: 3 }, () =>
          pickCars(world.ports(), actor, {
            act: uuid(),
            seriesId: night.seriesId,
            eventId: night.eventId,
            picks: [{ inspectionId: uuid(), entryId, because: 'nominated', words: 'Asked twice' }],
          }),
        ),
      ),
    );
    expect(answers.filter(({ ok }) => ok)).toHaveLength(1);
    for (const answer of answers.filter(({ ok }) => !ok))
      expect(failureOf(answer).faults?.[0]?.detail).toMatch(
        /^Car 31 is picked already: nominated, by (Ilse Törnkvist|Second Official), /,
      );
  });
});
