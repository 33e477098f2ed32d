import sharp from 'sharp';
import { afterAll, beforeAll, expect, it } from 'vitest';
import { sha256, toHex } from '@/domain/ledger/bytes';
import { MOST_AT_ONCE, partSizes } from '@/domain/paperwork/file/limits';
import { KeptFile } from '@/entities/paperwork/file';
import { openOriginal, openPreview } from '@/services/file/open-file';
import { confirmUpload } from '@/services/file/upload/confirm-upload';
import { expectUpload } from '@/services/file/upload/expect-upload';
import { StoreUnreachable } from '@/services/ports';
import { keepPhotograph, openPaddock, type Paddock, picture, start } from '../../support/paperwork';
import { openWorld, type World } from '../../support/world';
import { must } from '../rulebook/build';

let world: World;
let paddock: Paddock;
let paperworkId: string;
let large: Buffer;

beforeAll(async () => {
  world = await openWorld();
  paddock = await openPaddock(world);
  paperworkId = await start(paddock, '1');
  large = await sharp({
    create: {
      width: 4_400,
      height: 3_300,
      channels: 3,
      background: '#777',
      noise: { type: 'gaussian', mean: 120, sigma: 60 },
    },
  })
    .jpeg({ quality: 98 })
    .toBuffer();
});
afterAll(() => world.close());

const announcement = (bytes: number) =>
  ({
    act: paddock.uuid(),
    fileId: paddock.uuid(),
    paperworkId,
    purpose: 'photograph',
    item: 'lifters-racked',
    name: 'large.jpg',
    type: 'image/jpeg',
    bytes,
  }) as const;

it('a large file is sent in parts, and goes on after a lost connection where it was', async () => {
  expect(large.length).toBeGreaterThan(MOST_AT_ONCE);
  const announced = announcement(large.length);
  const { fileId } = announced;
  const ask = async () => must(await expectUpload(paddock.ports(), paddock.competitor, announced));
  const first = await ask();
  expect(first.parts?.map(({ bytes }) => bytes)).toEqual(partSizes(large.length));
  // Announced again after a lost answer, by two tabs at once: the same upload.
  const again = await Promise.all([ask(), ask()]);
  for (const one of again) expect(one.parts).toEqual(first.parts);
  const row = await world
    .ports()
    .db.findOneOrFail(KeptFile, { id: fileId, seriesId: paddock.seriesId });
  const put = (number: number) => {
    const sizes = partSizes(large.length);
    const from = sizes.slice(0, number - 1).reduce((sum, size) => sum + size, 0);
    const part = large.subarray(from, from + (sizes[number - 1] ?? 0));
    paddock.objects.parts.set(`${row.uploadId} ${number}`, part);
  };
  const numbers = partSizes(large.length).map((_, at) => at + 1);
  const confirm = () =>
    confirmUpload(paddock.ports(), paddock.competitor, {
      act: paddock.uuid(),
      fileId,
      parts: numbers.map((number) => ({ number, tag: `tag ${number}` })),
    });
  for (const number of numbers.slice(1)) put(number);
  expect(await confirm()).toMatchObject({ failure: { name: 'not-in-this-state' } });
  put(1);
  const kept = must(await confirm());
  expect(kept).toMatchObject({ state: 'kept', sha256: toHex(sha256(large)), bytes: large.length });
  expect(must(await confirm())).toEqual(kept);
});

it('a small file goes in one request', async () => {
  const expected = must(
    await expectUpload(paddock.ports(), paddock.competitor, announcement(1_000)),
  );
  expect(expected.parts).toBeUndefined();
});

it('while the store does not answer, it is said so, and later it goes on', async () => {
  const { fileId } = await keepPhotograph(paddock, paperworkId, await picture(400, 300));
  const announced = announcement(large.length);
  const down = () => Promise.reject(new StoreUnreachable('no answer'));
  const unreachable = () =>
    world.ports({
      objects: {
        presignPut: (key, type, bytes) => paddock.objects.presignPut(key, type, bytes),
        findHead: down,
        read: down,
        write: down,
        remove: down,
      },
      uploads: { begin: down, presign: down, join: down, drop: down },
      images: paddock.ports().images,
    });
  const asked = [
    openPreview(unreachable(), paddock.competitor, { fileId, width: 640 }),
    openOriginal(unreachable(), paddock.competitor, { fileId }),
    expectUpload(unreachable(), paddock.competitor, announced),
    confirmUpload(unreachable(), paddock.competitor, {
      act: paddock.uuid(),
      fileId: must(await expectUpload(paddock.ports(), paddock.competitor, announcement(10)))
        .fileId,
    }),
  ];
  for (const answer of await Promise.all(asked))
    expect(answer).toMatchObject({
      ok: false,
      failure: {
        name: 'unavailable',
        detail: 'The file store does not answer just now. Nothing is lost: try again in a minute.',
      },
    });
  expect((await openPreview(paddock.ports(), paddock.competitor, { fileId, width: 640 })).ok).toBe(
    true,
  );
  expect(
    must(await expectUpload(paddock.ports(), paddock.competitor, announced)).parts?.length,
  ).toBeGreaterThan(1);
});
