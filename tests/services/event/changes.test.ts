import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { changeEntry } from '@/services/event/changes/change-entry';
import { enterCars } from '@/services/event/enter-cars';
import { findEvent } from '@/services/event/find-event';
import { pickCars } from '@/services/event/pick-cars';
import { tryCars } from '@/services/event/try-cars';
import { addClass } from '@/services/series/add-class';
import { failureOf, get, openRaceNight, type RaceNight } from '../../support/bay';
import { openWorld, type World } from '../../support/world';

let world: World;
let night: RaceNight;
let other: string;
beforeAll(async () => {
  world = await openWorld();
  night = await openRaceNight(world);
  other = uuid();
  const named = { id: other, seasonId: night.seasonId, name: 'Modified Four' };
  get(
    await addClass(world.ports(), night.official, {
      act: uuid(),
      seriesId: night.seriesId,
      ...named,
    }),
  );
});
afterAll(() => world.close());

const uuid = () => world.ports().random.uuid();
const at = () => ({ seriesId: night.seriesId, eventId: night.eventId });
const row = (carNumber: string, more = {}) => ({
  id: uuid(),
  classId: night.classId,
  carNumber,
  competitorName: `Competitor ${carNumber}`,
  engineReference: '',
  position: null as number | null,
  ...more,
});
const enter = (entries: ReturnType<typeof row>[], more = {}) =>
  enterCars(world.ports(), night.official, { act: uuid(), ...at(), entries, ...more });
const entryOf = async (carNumber: string, classId = night.classId) => {
  const { entries } = get(await findEvent(world.ports(), night.official, night.eventId));
  const found = entries.find((one) => one.carNumber === carNumber && one.classId === classId);
  if (found === undefined) throw new Error(`There is no car ${carNumber}.`);
  return found;
};
type Kind = 'scratched' | 'restored' | 'class' | 'engine' | 'driver';
const change = async (carNumber: string, kind: Kind, becomes = '', reason = 'Asked at sign-on') =>
  changeEntry(world.ports(), night.official, {
    act: uuid(),
    ...at(),
    entryId: (await entryOf(carNumber)).id,
    kind,
    becomes,
    reason,
  });
const kept = () =>
  world
    .ports()
    .db.execute<{ kind: string; was: string; becomes: string; reason: string }[]>(
      'select kind, was, becomes, reason from record.entry_change order by received_at, id',
    );

describe('changes on the day', () => {
  it('keep what was, what it became and why, in the record and in the ledger, not in public', async () => {
    get(await enter([row('1', { engineReference: 'VR-1' })]));
    get(await enter([row('2')], { lateReason: 'Held up on the road' }));
    get(await change('1', 'engine', 'VR-2', 'Blew up in the heat'));
    get(await change('1', 'driver', 'Joss Farrow', 'Owner is ill'));
    get(await change('2', 'scratched', '', 'Crashed in practice'));
    expect((await entryOf('2')).state).toBe('withdrawn');
    get(await change('2', 'restored', '', 'Repaired'));
    get(await change('2', 'class', other, 'Entered in the wrong class'));
    expect((await entryOf('2', other)).className).toBe('Modified Four');
    expect(await kept()).toEqual([
      { kind: 'late-entry', was: '', becomes: 'Car 2', reason: 'Held up on the road' },
      { kind: 'engine', was: 'VR-1', becomes: 'VR-2', reason: 'Blew up in the heat' },
      { kind: 'driver', was: '', becomes: 'Joss Farrow', reason: 'Owner is ill' },
      { kind: 'scratched', was: '', becomes: '', reason: 'Crashed in practice' },
      { kind: 'restored', was: '', becomes: '', reason: 'Repaired' },
      {
        kind: 'class',
        was: 'Street Stock',
        becomes: 'Modified Four',
        reason: 'Entered in the wrong class',
      },
    ]);
    const lines = await world.ports().db.execute<{ open: boolean; content: string }[]>(
      `select c.open, c.content from record.ledger_content c join record.ledger_line l
           on l.series_id = c.series_id and l.index = c.line_index
         where l.kind = 'entries-changed' and c.role = 'changes'`,
    );
    expect(lines).toHaveLength(6);
    expect(lines.some(({ open }) => open)).toBe(false);
  });

  it('are refused without a reason, into a taken number, to nothing, and by others', async () => {
    get(await enter([row('3'), row('3', { classId: other, competitorName: 'Bram Oxley' })]));
    expect(failureOf(await change('3', 'scratched', '', ' ')).faults?.[0]?.pointer).toBe('/reason');
    expect(failureOf(await change('3', 'class', other)).detail).toContain('Bram Oxley');
    expect(failureOf(await change('3', 'class', 'nowhere')).faults?.[0]?.pointer).toBe('/becomes');
    expect(failureOf(await change('3', 'engine')).faults?.[0]?.pointer).toBe('/becomes');
    expect(failureOf(await change('3', 'restored')).name).toBe('not-in-this-state');
    const { id } = await entryOf('3');
    const asked = { ...at(), entryId: id, kind: 'driver', becomes: 'X', reason: 'Y' } as const;
    for (const actor of [night.inspector, night.competitor])
      expect(
        failureOf(await changeEntry(world.ports(), actor, { act: uuid(), ...asked })).name,
      ).toBe('absent');
  });

  it('leave a picked car as it was picked, but for its driver', async () => {
    get(await enter([row('4')]));
    const { id } = await entryOf('4');
    const pick = { inspectionId: uuid(), entryId: id, because: 'position', words: '' } as const;
    get(await pickCars(world.ports(), night.official, { act: uuid(), ...at(), picks: [pick] }));
    expect(failureOf(await change('4', 'engine', 'VR-9')).detail).toContain(
      'picked for inspection',
    );
    get(await change('4', 'driver', 'Joss Farrow'));
  });
});

describe('a dry run', () => {
  it('says what each row would do and names every conflict, and writes nothing', async () => {
    get(await enter([row('10', { position: 1, laps: ['17.50'] }), row('11')]));
    const asked = [
      row('10', { position: 1, laps: ['17.50'] }),
      row('11', { laps: ['17,5'], driver: 'Ann' }),
      row('12'),
    ];
    const tried = get(await tryCars(world.ports(), night.official, { ...at(), entries: asked }));
    expect(tried).toEqual({ does: ['same', 'changed', 'new'], faults: [] });
    await expect(entryOf('12')).rejects.toThrow('no car 12');
    const wrong = [
      row('10', { competitorName: 'Somebody Else' }),
      row('13', { position: 1 }),
      row('14', { position: 7 }),
      row('15', { position: 7 }),
    ];
    const { faults } = get(
      await tryCars(world.ports(), night.official, { ...at(), entries: wrong }),
    );
    expect(faults).toEqual([
      { pointer: '/entries/0/competitorName', detail: 'Car 10 is entered by Competitor 10.' },
      { pointer: '/entries/3/position', detail: 'Cars 14 and 15 cannot both be 7.' },
    ]);
    const clash = [row('13', { position: 1 })];
    expect(
      get(await tryCars(world.ports(), night.official, { ...at(), entries: clash })).faults,
    ).toEqual([{ pointer: '/entries/0/position', detail: 'Cars 10 and 13 cannot both be 1.' }]);
    expect(
      failureOf(await tryCars(world.ports(), night.inspector, { ...at(), entries: asked })).name,
    ).toBe('absent');
  });

  it('remembers the columns that were chosen when the file was entered', async () => {
    get(await enter([row('20')], { columns: { carNumber: 'startnummer' } }));
    get(await enter([row('21')], { columns: { carNumber: 'nr', competitor: 'fahrer' } }));
    const rows = await world
      .ports()
      .db.execute<{ columns: unknown }[]>('select columns from public.column_choice');
    expect(rows).toEqual([{ columns: { carNumber: 'nr', competitor: 'fahrer' } }]);
  });
});
