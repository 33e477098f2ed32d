import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { SwapRequest } from '@/contracts/engine/swap';
import { sha256, toHex } from '@/domain/ledger/bytes';
import { findSwappable } from '@/services/engine/swap/find-swappable';
import { listOwnSwaps, listSwapsToCheck } from '@/services/engine/swap/list-swaps';
import { swapEngine } from '@/services/engine/swap/swap-engine';
import { createEvent } from '@/services/event/create-event';
import { enterCars } from '@/services/event/enter-cars';
import { pickCars } from '@/services/event/pick-cars';
import { keepFile } from '@/services/file/keep-file';
import { openOriginal } from '@/services/file/open-file';
import { decidePaperwork } from '@/services/paperwork/decide-paperwork';
import { handedIn, openPaddock, type Paddock, picture } from '../../support/paperwork';
import { openWorld, type World } from '../../support/world';
import { must } from '../rulebook/build';

let world: World;
let paddock: Paddock;
let eventId: string;
let first: { readonly paperworkId: string };
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
