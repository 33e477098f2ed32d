import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { toHex } from '@/domain/ledger/bytes';
import { chainHead } from '@/domain/ledger/chain';
import { saveGauge } from '@/services/gauge/save-gauge';
import { changeState } from '@/services/inspection/change-state';
import { assessFile } from '@/services/inspection/read/assess-file';
import {
  failureOf,
  fileOf,
  gaugeFigures,
  get,
  openInspection,
  openRaceNight,
  type RaceNight,
  rowsFor,
  send,
} from '../../support/bay';
import { addActor, addSeries, openWorld, type World } from '../../support/world';

let world: World;
let night: RaceNight;
beforeAll(async () => {
  world = await openWorld();
  night = await openRaceNight(world);
});
afterAll(() => world.close());

const stateOf = async (inspectionId: string, clause: string, position: string) => {
  const assessed = assessFile(await fileOf(world, night.chief, inspectionId));
  return assessed.findings
    .find((finding) => finding.clause === clause)
    ?.perPosition.find((result) => result.position === position);
};

/** Batches as a stranger sees them, and the head worked out from them alone. */
const chainOf = async (inspectionId: string) => {
  const rows = await world
    .ports()
    .db.execute<{ number: number; document: string; head: Buffer }[]>(
      'select number, document, head from record.capture_batch where inspection_id = ? order by number',
      [inspectionId],
    );
  const documents = rows.map((row) => JSON.parse(row.document));
  return {
    numbers: rows.map((row) => row.number),
    acts: documents.map((document) => document.act as string),
    head: rows.length === 0 ? '' : toHex(new Uint8Array(rows.at(-1)?.head ?? [])),
    workedOut: toHex(chainHead(inspectionId, documents)),
  };
};

describe('readings from the bay', () => {
  it('are kept as written, and give the clearance that their text says exactly', async () => {
    const id = await openInspection(world, night, '1');
    const { fullBore } = rowsFor(world, night);
    const sent = fullBore();
    const answer = get(await send(world, night.inspector, id, sent));
    expect(answer).toMatchObject({ batch: 1, received: [], marked: [] });
    const { rows } = await fileOf(world, night.inspector, id);
    expect(rows.readings.map(({ value }) => `${value.text} ${value.unit}`)).toEqual([
      '0.8423 in',
      '0.0 thou',
      '0.1 thou',
      '0.1 thou',
      '0.0 thou',
    ]);
    // 0.8440 + mean(0, 0.0001, 0.0001, 0) − 0.8423 = 0.00175 in
    expect((await stateOf(id, '4.6', '1 exhaust'))?.exact).toEqual({ text: '0.00175', unit: 'in' });
    expect((await stateOf(id, '4.6', '1 exhaust'))?.state).toBe('within');
    const [exact] = await world
      .ports()
      .db.execute<{ value_exact: string }[]>(
        'select value_exact from record.reading where id = ?',
        [sent.find((row) => row.kind === 'reading')?.id],
      );
    // 0.8423 in × 25,400,000,000 pm
    expect(exact?.value_exact).toBe('21394420000');
  });

  it('mean the same in whatever order their batches arrive', async () => {
    const [inOrder, outOfOrder] = [
      await openInspection(world, night, '2A'),
      await openInspection(world, night, '2B'),
    ];
    const rows = rowsFor(world, night).fullBore('3', ['0.1', '0.0', '0.2', '0.1']);
    for (const row of rows) get(await send(world, night.inspector, inOrder, [row]));
    const again = rowsFor(world, night).fullBore('3', ['0.1', '0.0', '0.2', '0.1']);
    for (const row of [...again].reverse())
      get(await send(world, night.inspector, outOfOrder, [row]));
    const found = [inOrder, outOfOrder].map(async (id) => {
      const { state, exact, uncertainty } = (await stateOf(id, '4.6', '3 exhaust')) ?? {};
      return { state, exact, uncertainty };
    });
    const [first, second] = await Promise.all(found);
    expect(first).toEqual(second);
    expect(first?.exact).toEqual({ text: '0.0018', unit: 'in' });
  });

  it('sent six times at once are kept once, and every sender hears the same', async () => {
    const id = await openInspection(world, night, '3');
    const rows = rowsFor(world, night).fullBore();
    const act = world.ports().random.uuid();
    const answers = await Promise.all(
      Array.from({ length: 6 }, () => send(world, night.inspector, id, rows, { act })),
    );
    for (const answer of answers) expect(answer).toEqual(answers[0]);
    expect(answers[0]).toMatchObject({ ok: true, value: { batch: 1 } });
    const file = await fileOf(world, night.inspector, id);
    expect(file.rows.readings).toHaveLength(5);
    expect(file.chain.batches).toBe(1);
  });

  it('under a known act with other content are refused, and so is a row sent before', async () => {
    const id = await openInspection(world, night, '4');
    const { reading } = rowsFor(world, night);
    const act = world.ports().random.uuid();
    const row = reading({});
    get(await send(world, night.inspector, id, [row], { act }));
    const other = await send(world, night.inspector, id, [reading({})], { act });
    expect(failureOf(other).name).toBe('same-id-other-content');
    const again = await send(world, night.inspector, id, [reading({}), row]);
    expect(failureOf(again).faults).toEqual([
      { pointer: '/rows/1/id', detail: 'A row of this identifier is kept already.' },
    ]);
    expect((await fileOf(world, night.inspector, id)).rows.readings).toHaveLength(1);
  });

  it('of two tablets at once make one linear chain that a stranger works out alike', async () => {
    const id = await openInspection(world, night, '5');
    const { reading } = rowsFor(world, night);
    const tablets = [night.inspector, night.chief].flatMap((actor) =>
      Array.from({ length: 12 }, () => send(world, actor, id, [reading({})])),
    );
    const answers = (await Promise.all(tablets)).map(get);
    const chain = await chainOf(id);
    expect(chain.numbers).toEqual(Array.from({ length: 24 }, (_, i) => i + 1));
    expect(answers.map((answer) => answer.batch).sort((a, b) => a - b)).toEqual(chain.numbers);
    expect(new Set(chain.acts).size).toBe(24);
    expect(chain.head).toBe(chain.workedOut);
  });

  it('name the place of what the register or the inspection does not know', async () => {
    const id = await openInspection(world, night, '6');
    const { reading, strike } = rowsFor(world, night);
    const nothing = world.ports().random.uuid();
    const refused = failureOf(
      await send(world, night.inspector, id, [
        reading({}),
        reading({ gaugeId: nothing }),
        strike(nothing),
      ]),
    );
    expect(refused.faults?.map((fault) => fault.pointer)).toEqual([
      '/rows/1/gaugeId',
      '/rows/2/readingId',
    ]);
    expect((await fileOf(world, night.inspector, id)).rows.readings).toEqual([]);
  });
});

describe('strikes and moves', () => {
  it('are rows that point back: the reading stays, and counts no more or elsewhere', async () => {
    const id = await openInspection(world, night, '7');
    const { reading, strike, move } = rowsFor(world, night);
    const [wrong, right, astray] = [
      reading({ value: { text: '0.8243', unit: 'in' } }),
      reading({}),
      reading({}),
    ];
    get(await send(world, night.inspector, id, [wrong, right, astray]));
    get(await send(world, night.inspector, id, [strike(wrong.id), move(astray.id, '3')]));
    const file = await fileOf(world, night.inspector, id);
    expect(file.rows.readings).toHaveLength(3);
    const { judged } = assessFile(file);
    expect(
      judged.map(({ row, state, place, reason }) => [row.id, state, place.cylinder, reason]),
    ).toEqual([
      [wrong.id, 'struck', '1', 'wrong-value'],
      [right.id, 'counts', '1', undefined],
      [astray.id, 'counts', '3', undefined],
    ]);
    const chain = await chainOf(id);
    expect(chain.head).toBe(chain.workedOut);
  });
});

describe('who may record', () => {
  it('is the inspector named and the chief; others of the series are kept and do not count', async () => {
    const id = await openInspection(world, night, '8');
    const { reading } = rowsFor(world, night);
    const other = await addActor(world, 'Wim Aldergate', [
      { seriesId: night.seriesId, role: 'inspector' },
    ]);
    const answer = get(await send(world, other, id, [reading({})]));
    expect(answer.received[0]?.reason).toBe(
      'Wim Aldergate was not the inspector named for this car.',
    );
    get(await send(world, night.chief, id, [reading({})]));
    const { readings } = (await fileOf(world, night.inspector, id)).rows;
    expect(readings.map((row) => row.standing)).toEqual(['received', 'accepted']);
  });

  it('is nobody else: the answer is that of an unknown inspection', async () => {
    const id = await openInspection(world, night, '9');
    const { reading } = rowsFor(world, night);
    const stranger = await addActor(world, 'Nobody Here');
    const away = await addActor(world, 'Away Inspector', [
      { seriesId: await addSeries(world, 'another-series'), role: 'inspector' },
    ]);
    for (const actor of [night.competitor, night.official, stranger, away])
      expect(failureOf(await send(world, actor, id, [reading({})])).name).toBe('absent');
    const nothing = world.ports().random.uuid();
    expect(failureOf(await send(world, night.inspector, nothing, [reading({})])).name).toBe(
      'absent',
    );
  });
});

describe('an inspection that is not open', () => {
  it('keeps what arrives as received, with the reason, and counts none of it', async () => {
    const id = await openInspection(world, night, '10');
    const { fullBore, reading } = rowsFor(world, night);
    get(await send(world, night.inspector, id, fullBore()));
    const stop = { act: world.ports().random.uuid(), inspectionId: id, to: 'stop' } as const;
    expect(
      failureOf(await changeState(world.ports(), night.inspector, { ...stop, reason: ' ' })).name,
    ).toBe('invalid');
    get(await changeState(world.ports(), night.inspector, { ...stop, reason: 'Storm' }));
    const answer = get(await send(world, night.inspector, id, [reading({})]));
    expect(answer.received[0]?.reason).toBe('The inspection was stopped when this arrived.');
    const { judged } = assessFile(await fileOf(world, night.inspector, id));
    expect(judged.map(({ state }) => state).filter((state) => state === 'received')).toHaveLength(
      1,
    );
  });
});

describe('a gauge that is not in order', () => {
  it('overdue or withdrawn: its readings are kept, marked, and support no breach', async () => {
    const id = await openInspection(world, night, '11');
    const overdue = world.ports().random.uuid();
    const figures = { ...gaugeFigures.micrometer, dueOn: '2026-06-01' };
    get(
      await saveGauge(world.ports(), night.chief, {
        act: world.ports().random.uuid(),
        seriesId: night.seriesId,
        id: overdue,
        code: 'MC-09',
        description: figures,
        status: 'in-use',
        version: 0,
      }),
    );
    const { reading } = rowsFor(world, night);
    const big = reading({ gaugeId: overdue, value: { text: '0.8500', unit: 'in' } });
    const answer = get(await send(world, night.inspector, id, [big]));
    expect(answer.marked).toEqual([
      { id: big.id, reason: 'gauge MC-09 was overdue for calibration' },
    ]);
    const result = await stateOf(id, '4.2', '1 exhaust');
    expect(result?.pass).not.toBe(false);
    const file = await fileOf(world, night.inspector, id);
    expect(file.rows.readings[0]?.note).toBe('gauge MC-09 was overdue for calibration');
    get(
      await saveGauge(world.ports(), night.chief, {
        act: world.ports().random.uuid(),
        seriesId: night.seriesId,
        id: overdue,
        code: 'MC-09',
        description: gaugeFigures.micrometer,
        status: 'withdrawn',
        version: 1,
      }),
    );
    const later = reading({ gaugeId: overdue, value: { text: '0.8500', unit: 'in' } });
    const marked = get(await send(world, night.inspector, id, [later])).marked;
    expect(marked).toEqual([{ id: later.id, reason: 'gauge MC-09 is withdrawn' }]);
  });
});
