import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { KeptFile } from '@/entities/paperwork/file';
import { confirmUpload } from '@/services/file/upload/confirm-upload';
import { expectUpload } from '@/services/file/upload/expect-upload';
import { sweepUpload } from '@/services/file/upload/sweep-upload';
import { openPaddock, type Paddock, picture, start } from '../../support/paperwork';
import { openWorld, type World } from '../../support/world';
import { must } from '../rulebook/build';

const HOUR = 3_600_000;

let world: World;
let paddock: Paddock;
let paperworkId: string;

beforeAll(async () => {
  world = await openWorld();
  paddock = await openPaddock(world);
  paperworkId = await start(paddock, '1');
});
afterAll(() => world.close());

/** Announces a photograph and puts its bytes, as a browser does that is closed before it confirms. */
const announce = async (sent = true) => {
  const { ports, competitor, uuid, seriesId, objects } = paddock;
  const fileId = uuid();
  const bytes = await picture();
  must(
    await expectUpload(ports(), competitor, {
      act: uuid(),
      fileId,
      paperworkId,
      purpose: 'photograph',
      item: 'lifters-racked',
      name: 'rack.jpg',
      type: 'image/jpeg',
      bytes: bytes.length,
    }),
  );
  const key = `uploads/${seriesId}/${fileId}`;
  if (sent) await objects.write(key, bytes, 'image/jpeg');
  return { fileId, key };
};

const sweep = (fileId: string) =>
  sweepUpload(paddock.ports(), { seriesId: paddock.seriesId, fileId });

const rowOf = (fileId: string) =>
  paddock.ports().db.findOneOrFail(KeptFile, { seriesId: paddock.seriesId, id: fileId });

const confirm = (fileId: string) =>
  confirmUpload(paddock.ports(), paddock.competitor, { act: paddock.uuid(), fileId });

describe('an upload that is never confirmed', () => {
  it('is looked at a day after it was announced, by a job of the same act', async () => {
    const { fileId } = await announce();
    const jobs = await paddock.ports().db.execute<{ data: object; after: Date }[]>(
      `select data, start_after as after from jobs.job
       where name = 'sweep-uploads' and data->>'fileId' = ?`,
      [fileId],
    );
    expect(jobs.map(({ data }) => data)).toEqual([{ seriesId: paddock.seriesId, fileId }]);
    const { createdAt } = await rowOf(fileId);
    expect(new Date(jobs[0]?.after ?? 0).getTime()).toBe(createdAt.getTime() + 24 * HOUR);
  });

  it('is refused with words and its bytes removed, after a day and not before; a repeat changes nothing', async () => {
    const { fileId, key } = await announce();
    world.clock.advance(22 * HOUR);
    await sweep(fileId);
    expect((await rowOf(fileId)).state).toBe('expected');
    expect(paddock.objects.stored.has(key)).toBe(true);
    world.clock.advance(2 * HOUR);
    await sweep(fileId);
    const row = await rowOf(fileId);
    expect([row.state, paddock.objects.stored.has(key)]).toEqual(['refused', false]);
    expect(row.refusedBecause).toMatch(/not confirmed within a day.*Send it again\.$/);
    await sweep(fileId);
    expect((await rowOf(fileId)).refusedBecause).toBe(row.refusedBecause);
    expect(must(await confirm(fileId))).toEqual({
      fileId,
      state: 'refused',
      refusedBecause: row.refusedBecause,
    });
  });

  it('of which nothing arrived is refused as well', async () => {
    const { fileId } = await announce(false);
    world.clock.advance(24 * HOUR);
    await sweep(fileId);
    expect((await rowOf(fileId)).state).toBe('refused');
  });

  it('stays expected while the store cannot remove it, and is swept by the next try', async () => {
    const { fileId, key } = await announce();
    world.clock.advance(24 * HOUR);
    const remove = paddock.objects.remove.bind(paddock.objects);
    paddock.objects.remove = () => Promise.reject(new Error('connect ECONNREFUSED'));
    await expect(sweep(fileId)).rejects.toThrow('ECONNREFUSED');
    paddock.objects.remove = remove;
    expect((await rowOf(fileId)).state).toBe('expected');
    await sweep(fileId);
    expect([(await rowOf(fileId)).state, paddock.objects.stored.has(key)]).toEqual([
      'refused',
      false,
    ]);
  });
});

describe('an upload that was confirmed', () => {
  it('is left as it is', async () => {
    const { fileId } = await announce();
    expect(must(await confirm(fileId)).state).toBe('kept');
    world.clock.advance(48 * HOUR);
    await sweep(fileId);
    const row = await rowOf(fileId);
    expect([row.state, row.refusedBecause]).toEqual(['kept', null]);
    expect(paddock.objects.stored.has(row.objectKey ?? '')).toBe(true);
  });

  it('what was put there once more after the file counted is removed, and the file stays', async () => {
    const { fileId, key } = await announce();
    must(await confirm(fileId));
    await paddock.objects.write(key, await picture(), 'image/jpeg');
    world.clock.advance(24 * HOUR);
    await sweep(fileId);
    expect([(await rowOf(fileId)).state, paddock.objects.stored.has(key)]).toEqual(['kept', false]);
  });

  it('parts of a large one are forgotten', async () => {
    const { ports, competitor, uuid, objects, seriesId } = paddock;
    const fileId = uuid();
    const announced = { act: uuid(), fileId, paperworkId, purpose: 'photograph' } as const;
    const file = {
      item: 'lifters-racked',
      name: 'rack.jpg',
      type: 'image/jpeg',
      bytes: 20_000_000,
    };
    must(await expectUpload(ports(), competitor, { ...announced, ...file }));
    const { uploadId } = await rowOf(fileId);
    objects.parts.set(`${uploadId} 1`, new Uint8Array(10));
    world.clock.advance(24 * HOUR);
    await sweepUpload(ports(), { seriesId, fileId });
    expect([(await rowOf(fileId)).state, objects.parts.size]).toEqual(['refused', 0]);
  });
});
