import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { SwapRequest } from '@/contracts/engine/swap';
import type { Actor } from '@/domain/access/permission';
import { sha256, toHex } from '@/domain/ledger/bytes';
import { isLegalNotice, topicOf } from '@/domain/mail/mail-topics';
import { findSwappable } from '@/services/engine/swap/find-swappable';
import { listOwnSwaps, listSwapsToCheck } from '@/services/engine/swap/list-swaps';
import { swapEngine } from '@/services/engine/swap/swap-engine';
import { createEvent } from '@/services/event/create-event';
import { enterCars } from '@/services/event/enter-cars';
import { pickCars } from '@/services/event/pick-cars';
import { keepFile } from '@/services/file/keep-file';
import { openOriginal } from '@/services/file/open-file';
import { confirmUpload } from '@/services/file/upload/confirm-upload';
import { expectUpload } from '@/services/file/upload/expect-upload';
import { sweepUpload } from '@/services/file/upload/sweep-upload';
import { decidePaperwork } from '@/services/paperwork/decide-paperwork';
import { remindDue } from '@/services/paperwork/remind-due';
import { remindOverdue } from '@/services/paperwork/remind-overdue';
import { setSwapDays } from '@/services/series/set-swap-days';
import { handedIn, openPaddock, type Paddock, picture, start } from '../../support/paperwork';
import { openWorld, type World } from '../../support/world';
import { must } from '../rulebook/build';

let world: World;
let paddock: Paddock;
let eventId: string;
let first: { readonly paperworkId: string };
const HOUR = 3_600_000;
const photograph = await picture(200, 150);

const rows = <T>(sql: string, parameters: unknown[] = []) =>
  world.ports().db.execute<T[]>(sql, parameters);

beforeAll(async () => {
  world = await openWorld();
  paddock = await openPaddock(world);
  const { ports, uuid, official, seriesId, seasonId, classId } = paddock;
  first = await handedIn(paddock, '12J');
  must(
    await decidePaperwork(ports(), official, {
      act: uuid(),
      paperworkId: first.paperworkId,
      number: 1,
      decision: 'accepted',
      remarks: [],
    }),
  );
  eventId = uuid();
  must(
    await createEvent(ports(), official, {
      act: uuid(),
      seriesId,
      id: eventId,
      seasonId,
      slug: 'round-1',
      name: 'Round 1',
      track: 'Quarrel Fen Oval',
      zone: 'America/Chicago',
      startsAt: '2026-07-11T21:00:00.000Z',
      endsAt: '2026-07-12T04:00:00.000Z',
      protestMinutes: 30,
    }),
  );
  const entries = [
    { id: uuid(), carNumber: '12J', competitorName: 'Ada Lindqvist' },
    { id: uuid(), carNumber: '9', competitorName: 'Teo Marsh' },
    { id: uuid(), carNumber: '10', competitorName: 'Nell Varga' },
  ].map((row) => ({ ...row, classId, competitorEmail: '', engineReference: '', position: null }));
  must(await enterCars(ports(), official, { act: uuid(), seriesId, eventId, entries } as never));
});
afterAll(() => world.close());

const entryOf = async (carNumber: string): Promise<string> => {
  const [row] = await rows<{ id: string }>('select id from public.entry where car_number = ?', [
    carNumber,
  ]);
  return row?.id ?? '';
};

const swap = async (change: Partial<SwapRequest> = {}): Promise<SwapRequest> => ({
  act: paddock.uuid(),
  id: paddock.uuid(),
  entryId: await entryOf('12J'),
  engine: { id: paddock.uuid(), reference: 'SPARE-1', blockCasting: '41-9' },
  seal: 'T-0417',
  paperworkId: paddock.uuid(),
  photograph: { fileId: paddock.uuid(), sha256: toHex(sha256(photograph)) },
  ...change,
});

describe('a race-night engine swap', () => {
  it('is open to the car’s own competitor at an event of these days', async () => {
    const { ports, competitor, rival, official } = paddock;
    expect((await findSwappable(ports(), competitor)).map(({ carNumber }) => carNumber)).toEqual([
      '12J',
    ]);
    expect(await findSwappable(ports(), rival)).toEqual([]);
    for (const other of [rival, official])
      expect(await swapEngine(ports(), other, await swap())).toMatchObject({
        failure: { name: 'absent' },
      });
    world.clock.set('2026-07-14T00:00:00.000Z');
    expect(await swapEngine(ports(), competitor, await swap())).toMatchObject({
      failure: { name: 'absent' },
    });
    world.clock.set('2026-07-11T20:00:00.000Z');
  });

  it('changes the entry’s engine at once, is seen by officials, and takes its photograph afterwards', async () => {
    const { ports, competitor, official, uuid } = paddock;
    const asked = await swap();
    const answer = must(await swapEngine(ports(), competitor, asked));
    expect(answer).toEqual({
      paperworkId: asked.paperworkId,
      dueAt: '2026-07-14T20:00:00.000Z',
      inspected: false,
    });
    expect(must(await swapEngine(ports(), competitor, asked))).toEqual(answer);
    const [entry] = await rows(
      'select engine_reference, paperwork_id from public.entry where id = ?',
      [asked.entryId],
    );
    expect(entry).toEqual({ engine_reference: 'SPARE-1', paperwork_id: asked.paperworkId });
    const [listed] = await listSwapsToCheck(ports(), official);
    expect(listed).toMatchObject({
      carNumber: '12J',
      from: 'VR-2231',
      to: 'SPARE-1',
      seal: 'T-0417',
      photograph: 'not-in-yet',
      handedIn: false,
    });
    const { fileId } = asked.photograph;
    const file = {
      paperworkId: asked.paperworkId,
      purpose: 'photograph',
      item: 'engine-swap',
      name: 'seal.jpg',
      declaredType: 'image/jpeg',
    } as const;
    must(
      await keepFile(ports(), competitor, {
        act: uuid(),
        fileId,
        ...file,
        declaredBytes: photograph.length,
        bytes: photograph,
      }),
    );
    expect((await listSwapsToCheck(ports(), official))[0]?.photograph).toBe('kept');
    expect(await openOriginal(ports(), official, { fileId })).toMatchObject({ ok: true });
    expect(await openOriginal(ports(), paddock.rival, { fileId })).toMatchObject({
      failure: { name: 'absent' },
    });
    expect(await listOwnSwaps(ports(), paddock.rival)).toEqual([]);
    const [line] = await rows<{ n: number }>(
      "select count(*)::int as n from record.ledger_line where kind = 'engine-swapped'",
    );
    expect(line?.n).toBe(1);
    const mails = await rows<{ n: number }>(
      "select count(*)::int as n from public.mail where kind = 'engine-swapped'",
    );
    // Three officials and the competitor.
    expect(mails).toEqual([{ n: 4 }]);
  });

  it('goes into a car for which nothing was declared before', async () => {
    const { ports, stranger } = paddock;
    await rows('update public.entry set competitor_id = ? where car_number = ?', [
      stranger.personId,
      '10',
    ]);
    const asked = await swap({ entryId: await entryOf('10') });
    expect(must(await swapEngine(ports(), stranger, asked)).paperworkId).toBe(asked.paperworkId);
    const [kept] = await rows('select from_engine_id from record.engine_swap where id = ?', [
      asked.id,
    ]);
    expect(kept).toEqual({ from_engine_id: null });
  });

  it('is refused into the same engine, and under a name that is taken', async () => {
    const { ports, competitor } = paddock;
    const [in_] = await rows<{ engine_id: string }>(
      'select engine_id from public.entry where car_number = ?',
      ['12J'],
    );
    const same = await swap({ engine: { id: in_?.engine_id ?? '' } });
    expect(await swapEngine(ports(), competitor, same)).toMatchObject({
      failure: { faults: [{ pointer: '/engine' }] },
    });
    const taken = await swap({
      engine: { id: paddock.uuid(), reference: 'VR-2231', blockCasting: '' },
    });
    expect(await swapEngine(ports(), competitor, taken)).toMatchObject({
      failure: { faults: [{ pointer: '/engine/reference' }] },
    });
  });

  it('counts for picks after it, and never for an inspection that was opened before', async () => {
    const { ports, competitor, official, uuid, seriesId } = paddock;
    const inspectionId = uuid();
    const entryId = await entryOf('12J');
    const pick = { entryId, inspectionId, because: 'nominated', words: 'New engine', layout: '' };
    must(
      await pickCars(ports(), official, { act: uuid(), seriesId, eventId, picks: [pick] } as never),
    );
    const pinned = () =>
      rows('select paperwork_id from public.inspection where id = ?', [inspectionId]);
    // The paperwork of the engine that came out is accepted, and is not taken for the one that went in.
    expect(await pinned()).toEqual([{ paperwork_id: null }]);
    const back = await swap({ engine: { id: paddock.engineId }, seal: 'T-0418' });
    expect(must(await swapEngine(ports(), competitor, back))).toMatchObject({
      paperworkId: first.paperworkId,
      inspected: true,
    });
    expect(await pinned()).toEqual([{ paperwork_id: null }]);
    // The photograph finds its place although that paperwork is closed; another file does not.
    const file = {
      paperworkId: first.paperworkId,
      purpose: 'photograph',
      item: 'engine-swap',
      name: 'b.jpg',
      declaredType: 'image/jpeg',
    } as const;
    const kept = (fileId: string) =>
      keepFile(ports(), competitor, {
        act: uuid(),
        fileId,
        ...file,
        declaredBytes: photograph.length,
        bytes: photograph,
      });
    expect(await kept(back.photograph.fileId)).toMatchObject({ ok: true });
    expect(await kept(uuid())).toMatchObject({ failure: { name: 'not-in-this-state' } });
  });
});

describe('the day by which the rest is due', () => {
  const days = (actor: Actor, value: string) =>
    setSwapDays(paddock.ports(), actor, {
      act: paddock.uuid(),
      seriesId: paddock.seriesId,
      classId: paddock.classId,
      days: value,
    });
  const overdue = () =>
    rows<{ address: string; subject: string; message_id: string }>(
      "select address, subject, message_id from public.mail where kind = 'overdue' order by created_at",
    );
  const dueSoon = () => rows("select 1 from public.mail where kind = 'due-soon'");
  const remind = async () => {
    await remindDue(paddock.ports());
    await remindOverdue(paddock.ports());
  };

  it('is set by the class’s officials, from 1 to 30 days, for swaps to come', async () => {
    const { official, competitor } = paddock;
    expect(await days(competitor, '5')).toMatchObject({ failure: { name: 'absent' } });
    for (const wrong of ['0', '31', '-1', '2.5', 'three', ''])
      expect(await days(official, wrong)).toMatchObject({
        failure: { faults: [{ pointer: '/days' }] },
      });
    const before = await rows('select id, due_at from record.engine_swap order by id');
    expect(must(await days(official, '1'))).toEqual({ days: 1 });
    expect(await rows('select id, due_at from record.engine_swap order by id')).toEqual(before);
  });

  it('is told of when half of a short time has passed, and once when it is over', async () => {
    const { ports, competitor } = paddock;
    await rows("update public.paperwork set state = 'withdrawn' where state = 'draft'");
    const asked = await swap({
      engine: { id: paddock.uuid(), reference: 'SPARE-2', blockCasting: '' },
    });
    const { dueAt } = must(await swapEngine(ports(), competitor, asked));
    const swappedAt = world.clock.now().getTime();
    expect(Date.parse(dueAt)).toBe(swappedAt + 24 * HOUR);
    const at = (hours: number) => world.clock.set(new Date(swappedAt + hours * HOUR).toISOString());

    at(11);
    await remind();
    expect(await dueSoon()).toEqual([]);
    at(13);
    await remind();
    await remind();
    expect((await dueSoon()).length).toBe(1);
    expect(await overdue()).toEqual([]);
    at(24);
    await remind();
    at(30);
    await remind();
    const told = await overdue();
    expect(told.map(({ subject }) => subject)).toEqual([
      expect.stringMatching(/^Overdue: paperwork for car 12J, /),
    ]);
    expect(told[0]?.message_id).toMatch(/^<[0-9a-f-]{36}@/);
    const [row] = await listOwnSwaps(ports(), competitor);
    expect(row).toMatchObject({ to: 'SPARE-2', dueAt, handedIn: false });
  });

  it('is told of to nobody whose paperwork is handed in, nor of a day long past', async () => {
    const { ports, competitor } = paddock;
    world.clock.set('2026-07-11T20:10:00.000Z');
    const asked = await swap({
      engine: { id: paddock.uuid(), reference: 'SPARE-3', blockCasting: '' },
    });
    must(await swapEngine(ports(), competitor, asked));
    const before = (await overdue()).length;
    const stands = (state: string) =>
      rows('update public.paperwork set state = ? where id = ?', [state, asked.paperworkId]);
    await stands('handed-in');
    world.clock.advance(25 * HOUR);
    await remind();
    expect((await overdue()).length).toBe(before);
    await stands('draft');
    world.clock.advance(8 * 24 * HOUR);
    await remind();
    expect((await overdue()).length).toBe(before);
  });

  it('may be turned off like other optional messages, which a notice may not', () => {
    expect(topicOf('overdue')?.id).toBe('due-soon');
    expect(isLegalNotice('overdue')).toBe(false);
  });
});

describe('a photograph that waited on a device', () => {
  it('still comes under its own id after its day, with paperwork that is closed by then', async () => {
    const { ports, competitor, rival, official, uuid, seriesId, objects } = paddock;
    world.clock.set('2026-07-11T20:30:00.000Z');
    const asked = await swap({ engine: { id: paddock.engineId }, seal: 'T-0420' });
    const { paperworkId } = must(await swapEngine(ports(), competitor, asked));
    expect(paperworkId).toBe(first.paperworkId);
    const { fileId } = asked.photograph;
    const announced = {
      fileId,
      paperworkId,
      purpose: 'photograph',
      item: 'engine-swap',
      name: 'seal.jpg',
      type: 'image/jpeg',
      bytes: photograph.length,
    } as const;
    const announce = (actor: Actor, change: object = {}) =>
      expectUpload(ports(), actor, { act: uuid(), ...announced, ...change });
    must(await announce(competitor));
    world.clock.advance(24 * HOUR);
    await sweepUpload(ports(), { seriesId, fileId });
    world.clock.advance(24 * HOUR);
    expect(await announce(rival)).toMatchObject({ failure: { name: 'absent' } });
    expect(await announce(competitor, { bytes: 12 })).toMatchObject({
      failure: { name: 'absent' },
    });
    const { url } = must(await announce(competitor));
    expect(url).toContain(fileId);
    // What was given up once is looked at once more, from the second announcement on.
    world.clock.advance(20 * HOUR);
    await sweepUpload(ports(), { seriesId, fileId });
    await objects.write(`uploads/${seriesId}/${fileId}`, photograph, 'image/jpeg');
    expect(must(await confirmUpload(ports(), competitor, { act: uuid(), fileId })).state).toBe(
      'kept',
    );
    const [listed] = (await listSwapsToCheck(ports(), official)).filter(
      ({ id }) => id === asked.id,
    );
    expect(listed).toMatchObject({
      photograph: 'kept',
      swappedAt: expect.stringMatching(/^20/),
      photographAt: expect.stringMatching(/^2026-07-14T/),
    });
  });

  it('that never came the second time is given up as well', async () => {
    const { ports, competitor, uuid, seriesId } = paddock;
    const fileId = uuid();
    const paperworkId = await start(paddock, '44');
    const announce = () =>
      expectUpload(ports(), competitor, {
        act: uuid(),
        fileId,
        paperworkId,
        purpose: 'photograph',
        item: 'lifters-racked',
        name: 'rack.jpg',
        type: 'image/jpeg',
        bytes: 4_000,
      });
    const stateOf = () => rows('select state from public.file where id = ?', [fileId]);
    for (const _ of [1, 2]) {
      must(await announce());
      expect(await stateOf()).toEqual([{ state: 'expected' }]);
      world.clock.advance(24 * HOUR);
      await sweepUpload(ports(), { seriesId, fileId });
      expect(await stateOf()).toEqual([{ state: 'refused' }]);
    }
  });
});
