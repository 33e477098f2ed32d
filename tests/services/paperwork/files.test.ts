import { deflateRawSync } from 'node:zlib';
import sharp from 'sharp';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { sha256, toHex } from '@/domain/ledger/bytes';
import { KeptFile } from '@/entities/paperwork/file';
import { makePreviews } from '@/services/file/make-previews';
import { openOriginal, openPreview } from '@/services/file/open-file';
import { removeFile } from '@/services/file/remove-file';
import { confirmUpload } from '@/services/file/upload/confirm-upload';
import { expectUpload } from '@/services/file/upload/expect-upload';
import { openPaperworkToCheck } from '@/services/paperwork/read/open-paperwork-to-check';
import { openOwnVersion } from '@/services/paperwork/read/open-version';
import { readSheetFile } from '@/services/paperwork/read-sheet-file';
import { packed } from '../../support/hostile/packed';
import { png } from '../../support/hostile/png';
import {
  fullDraft,
  handedIn,
  handIn,
  keepPhotograph,
  openPaddock,
  type Paddock,
  picture,
  save,
  start,
} from '../../support/paperwork';
import { openWorld, type World } from '../../support/world';
import { must } from '../rulebook/build';

let world: World;
let paddock: Paddock;
let paperworkId: string;

beforeAll(async () => {
  world = await openWorld();
  paddock = await openPaddock(world);
  paperworkId = await start(paddock, '1');
});
afterAll(() => world.close());

interface Sent {
  readonly bytes: Uint8Array;
  readonly purpose?: 'photograph' | 'sheet';
  readonly name?: string;
  readonly type?: string;
  readonly announced?: number;
}

/** Announces, puts and confirms a file as a browser does. */
const send = async ({
  bytes,
  purpose = 'photograph',
  name = 'p.jpg',
  type = 'image/jpeg',
  announced,
}: Sent) => {
  const fileId = paddock.uuid();
  const item = purpose === 'photograph' ? 'lifters-racked' : 'lifter-sheet';
  const expected = await expectUpload(paddock.ports(), paddock.competitor, {
    act: paddock.uuid(),
    fileId,
    paperworkId,
    purpose,
    item,
    name,
    type,
    bytes: announced ?? bytes.length,
  });
  if (!expected.ok) return { fileId, refused: expected.failure };
  await paddock.objects.write(`uploads/${paddock.seriesId}/${fileId}`, bytes, type);
  const confirmed = must(
    await confirmUpload(paddock.ports(), paddock.competitor, { act: paddock.uuid(), fileId }),
  );
  return { fileId, confirmed };
};

const because = async (sent: Sent): Promise<string> => {
  const { confirmed, refused } = await send(sent);
  if (refused !== undefined) return `${refused.name}: ${refused.detail}`;
  return confirmed?.state === 'refused' ? confirmed.refusedBecause : 'kept';
};

const utf8 = (text: string): Uint8Array => new TextEncoder().encode(text);

describe('a photograph', () => {
  it('is kept byte for byte under its own hash, whatever was announced of its type', async () => {
    const bytes = await picture();
    const { confirmed, fileId } = await send({ bytes, type: 'image/png', name: 'lifters.png' });
    expect(confirmed).toMatchObject({ state: 'kept', type: 'image/jpeg', bytes: bytes.length });
    const hash = toHex(sha256(bytes));
    expect(confirmed).toMatchObject({ sha256: hash });
    expect(
      Buffer.compare(Buffer.from(paddock.objects.stored.get(`originals/${hash}`)!.bytes), bytes),
    ).toBe(0);
    expect(paddock.objects.stored.has(`uploads/${paddock.seriesId}/${fileId}`)).toBe(false);
    const jobs = await world
      .ports()
      .db.execute<{ data: { fileId: string } }[]>(
        "select data from jobs.job where name = 'make-previews'",
      );
    expect(jobs.map(({ data }) => data.fileId)).toContain(fileId);
  });

  it('confirmed again, at once or later, gets the same answer', async () => {
    const bytes = await picture(200, 100);
    const { fileId, confirmed } = await send({ bytes });
    const again = await Promise.all(
      Array.from({ length: 4 }, () =>
        confirmUpload(paddock.ports(), paddock.competitor, { act: paddock.uuid(), fileId }),
      ),
    );
    for (const answer of again) expect(answer).toEqual({ ok: true, value: confirmed });
  });

  it('shows a preview to whoever asks before the job has run', async () => {
    const { fileId } = await send({ bytes: await picture(900, 600) });
    const preview = must(
      await openPreview(paddock.ports(), paddock.competitor, { fileId, width: 640 }),
    );
    expect((await sharp(Buffer.from(preview.bytes)).metadata()).width).toBe(640);
  });

  it('shows previews without the place where it was taken; the original keeps its bytes', async () => {
    const bytes = await sharp(await picture(1200, 800))
      .withExif({
        IFD3: {
          GPSLatitudeRef: 'N',
          GPSLatitude: '51/1 30/1 0/1',
          GPSLongitudeRef: 'W',
          GPSLongitude: '0/1 7/1 0/1',
        },
      })
      .jpeg()
      .toBuffer();
    // Tag 0x8825 points to the position (Exif 2.32, 4.6.3); in either byte order.
    const { exif = Buffer.alloc(0) } = await sharp(bytes).metadata();
    const pointer = [
      exif.indexOf(Buffer.from([0x25, 0x88])),
      exif.indexOf(Buffer.from([0x88, 0x25])),
    ];
    expect(Math.max(...pointer)).toBeGreaterThan(0);
    const { fileId } = await send({ bytes });
    await makePreviews(paddock.ports(), { seriesId: paddock.seriesId, fileId });
    for (const width of [160, 640, 1600]) {
      const preview = must(
        await openPreview(paddock.ports(), paddock.competitor, { fileId, width }),
      );
      const facts = await sharp(Buffer.from(preview.bytes)).metadata();
      expect([facts.format, facts.exif, facts.xmp, facts.iptc]).toEqual([
        'jpeg',
        undefined,
        undefined,
        undefined,
      ]);
      expect(facts.width).toBe(Math.min(width, 1200));
    }
    const original = must(await openOriginal(paddock.ports(), paddock.competitor, { fileId }));
    expect(Buffer.compare(Buffer.from(original.bytes), bytes)).toBe(0);
  });
});

describe('hostile and broken files are refused with the right words', () => {
  it('cut short on its way', async () => {
    const bytes = await sharp({
      create: {
        width: 800,
        height: 600,
        channels: 3,
        background: '#777',
        noise: { type: 'gaussian', mean: 120, sigma: 40 },
      },
    })
      .jpeg()
      .toBuffer();
    expect(await because({ bytes: bytes.subarray(0, Math.floor(bytes.length / 2)) })).toBe(
      'This JPEG picture is damaged or was cut short on its way. Take or send it again.',
    );
  });

  it.each([
    [
      'SVG named .jpg',
      '<svg xmlns="http://www.w3.org/2000/svg" onload="alert(1)"/>',
      'By its content this is a web page or drawing (HTML, SVG), whatever its name says. Add a JPEG, PNG, WebP or HEIC photograph.',
    ],
    [
      'HTML named .png',
      '<!doctype html><script>alert(1)</script>',
      'By its content this is a web page or drawing (HTML, SVG), whatever its name says. Add a JPEG, PNG, WebP or HEIC photograph.',
    ],
    [
      'GIF',
      'GIF89a\u0001\u0000\u0001\u0000',
      'By its content this is a GIF picture, whatever its name says. Add a JPEG, PNG, WebP or HEIC photograph.',
    ],
    [
      'a program',
      'MZ\u0090\u0000 not a picture',
      'By its content this is no picture, whatever its name says. Add a JPEG, PNG, WebP or HEIC photograph.',
    ],
  ])('%s', async (_name, text, words) => {
    expect(await because({ bytes: utf8(text), name: 'p.png', type: 'image/png' })).toBe(words);
  });

  it('a small file of 400 million pixels, without unfolding it', async () => {
    const bytes = png({ side: 20_000, depth: 1, colour: 0 });
    expect(bytes.length).toBeLessThan(200_000);
    expect(await because({ bytes })).toBe(
      'This picture has 400 million pixels; at most 50 million are taken. Send it in a smaller size.',
    );
  });

  it('another size than was announced', async () => {
    const bytes = await picture();
    expect(await because({ bytes, announced: bytes.length + 7 })).toBe(
      `${bytes.length + 7} bytes were announced and ${bytes.length} arrived. Send the file again.`,
    );
  });

  it('too large: before it is sent, and where it was announced smaller than it is', async () => {
    const words =
      'This photograph has 25.0 MB; at most 25.0 MB are taken. Send it in a smaller size from the phone.';
    expect(await because({ bytes: new Uint8Array(1), announced: 25_000_001 })).toBe(
      `too-large: ${words}`,
    );
    expect(await because({ bytes: new Uint8Array(25_000_001), announced: 1_000 })).toBe(words);
  });

  it('HEIC, with how to change it', async () => {
    const heic = Buffer.concat([
      Buffer.from([0, 0, 0, 24]),
      Buffer.from('ftypheic'),
      Buffer.alloc(40),
    ]);
    expect(await because({ bytes: heic, name: 'IMG_1.HEIC', type: 'image/heic' })).toContain(
      'share the photograph as JPEG',
    );
    expect(await because({ bytes: heic })).toContain('share the photograph as JPEG');
  });

  it('a packed file whose directory lies about what it unfolds to', async () => {
    const zeros = deflateRawSync(Buffer.alloc(60_000_000));
    const book = (stated: number) => packed([{ name: 'xl/workbook.xml', packed: zeros, stated }]);
    const words =
      'Unpacked, this XLSX file holds more than 20 MB; a measurement sheet has far less. Save only the sheet itself, or save it as CSV.';
    const sheet = { purpose: 'sheet', name: 'lifters.xlsx', type: 'application/zip' } as const;
    expect(await because({ ...sheet, bytes: book(60_000_000) })).toBe(words);
    expect(await because({ ...sheet, bytes: book(1_000) })).toBe(words);
    expect(
      await because({
        ...sheet,
        bytes: packed([{ name: 'a.txt', packed: deflateRawSync(Buffer.from('a')), stated: 1 }]),
      }),
    ).toContain('no XLSX sheet');
    expect(await because({ ...sheet, bytes: book(1_000).subarray(0, 900) })).toContain('damaged');
  });

  it('nothing arrived yet: it says so and may be asked again', async () => {
    const fileId = paddock.uuid();
    const bytes = await picture();
    const announced = {
      purpose: 'photograph',
      item: 'lifters-racked',
      name: 'a.jpg',
      type: 'image/jpeg',
      bytes: bytes.length,
    } as const;
    must(
      await expectUpload(paddock.ports(), paddock.competitor, {
        act: paddock.uuid(),
        fileId,
        paperworkId,
        ...announced,
      }),
    );
    const early = await confirmUpload(paddock.ports(), paddock.competitor, {
      act: paddock.uuid(),
      fileId,
    });
    expect(early).toMatchObject({ failure: { name: 'not-in-this-state' } });
    await paddock.objects.write(`uploads/${paddock.seriesId}/${fileId}`, bytes, 'image/jpeg');
    expect(
      await confirmUpload(paddock.ports(), paddock.competitor, { act: paddock.uuid(), fileId }),
    ).toMatchObject({ value: { state: 'kept' } });
  });

  it('no more than forty', async () => {
    const crowded = await start(paddock, '2');
    const announce = () =>
      expectUpload(paddock.ports(), paddock.competitor, {
        act: paddock.uuid(),
        fileId: paddock.uuid(),
        paperworkId: crowded,
        purpose: 'photograph',
        item: 'lifters-racked',
        name: 'a.jpg',
        type: 'image/jpeg',
        bytes: 10,
      });
    for (let i = 0; i < 40; i += 1) must(await announce());
    expect(await announce()).toMatchObject({ failure: { name: 'invalid' } });
  });
});

describe('a sheet', () => {
  const csv = utf8('Position;Lifter;Bore\n3 intake;0,8422;0.84.41\n3 exhaust;0,8423;0,8440\n');

  it('is read for the form that the rules ask for', async () => {
    const { fileId } = await send({
      bytes: csv,
      purpose: 'sheet',
      name: 'lifters.csv',
      type: 'text/csv',
    });
    const sheet = must(
      await readSheetFile(paddock.ports(), paddock.competitor, { fileId, subject: 'lifter-sheet' }),
    );
    expect(
      sheet.cells.map(({ position, typed, source }) => `${position} ${typed} ${source?.cell}`),
    ).toEqual([
      '3 intake 0,8422 B2',
      '3 intake 0.84.41 C2',
      '3 exhaust 0,8423 B3',
      '3 exhaust 0,8440 C3',
    ]);
  });

  it('another person’s is not there', async () => {
    const { fileId } = await send({
      bytes: csv,
      purpose: 'sheet',
      name: 'lifters.csv',
      type: 'text/csv',
    });
    for (const other of [paddock.rival, paddock.official]) {
      expect(
        await readSheetFile(paddock.ports(), other, { fileId, subject: 'lifter-sheet' }),
      ).toMatchObject({ failure: { name: 'absent' } });
      expect(await openOriginal(paddock.ports(), other, { fileId })).toMatchObject({
        failure: { name: 'absent' },
      });
      expect(
        await removeFile(paddock.ports(), other, { act: paddock.uuid(), fileId }),
      ).toMatchObject({ failure: { name: 'absent' } });
      expect(
        await confirmUpload(paddock.ports(), other, { act: paddock.uuid(), fileId }),
      ).toMatchObject({ failure: { name: 'absent' } });
    }
  });
});

describe('files and versions', () => {
  it('officials see what was handed in, no draft; a file taken out later stays in version 1', async () => {
    const id = await start(paddock, '3');
    const { fileId } = await keepPhotograph(paddock, id, await picture(300, 200));
    await makePreviews(paddock.ports(), { seriesId: paddock.seriesId, fileId });
    const see = (who: typeof paddock.official) =>
      openPreview(paddock.ports(), who, { fileId, width: 160 });
    expect((await see(paddock.official)).ok).toBe(false);
    await handIn(paddock, id, await save(paddock, id, 1, fullDraft()));
    expect((await see(paddock.official)).ok).toBe(true);
    expect((await see(paddock.rival)).ok).toBe(false);
    expect(
      await removeFile(paddock.ports(), paddock.competitor, { act: paddock.uuid(), fileId }),
    ).toMatchObject({ failure: { name: 'not-in-this-state' } });
    const draft = await world
      .ports()
      .db.findOneOrFail(KeptFile, { seriesId: paddock.seriesId, id: fileId });
    expect(draft.removedAt).toBeNull();
    const version = must(
      await openOwnVersion(paddock.ports(), paddock.competitor, { paperworkId: id, number: 1 }),
    );
    expect(version.document.photographs.map((file) => file.fileId)).toEqual([fileId]);
  });

  it('the same file handed in for another engine is pointed out to the official, and to nobody else', async () => {
    const first = await handedIn(paddock, '4');
    const other = await openPaddock(world);
    // The other engine races in the same series.
    const theirs: Paddock = {
      ...other,
      seriesId: paddock.seriesId,
      classId: paddock.classId,
      objects: paddock.objects,
      ports: paddock.ports,
      competitor: {
        ...other.competitor,
        standings: [{ seriesId: paddock.seriesId, role: 'competitor' as const }],
      },
    };
    const look = async (paperworkId: string, number = 1) =>
      must(await openPaperworkToCheck(paddock.ports(), paddock.official, { paperworkId, number }))
        .seenBefore;
    const before = await look(first.paperworkId);
    const second = await start(theirs, '5');
    const sent = await keepPhotograph(theirs, second, await picture());
    // What stands in a draft is its owner's alone, also from the official.
    expect(await look(first.paperworkId)).toEqual(before);
    await handIn(theirs, second, await save(theirs, second, 1, fullDraft()));
    const seen = await look(second);
    expect(seen.filter(({ carNumber }) => carNumber === '4')).toEqual([
      {
        fileId: sent.fileId,
        name: 'lifters.jpg',
        paperworkId: first.paperworkId,
        carNumber: '4',
        reference: 'VR-2231',
      },
    ]);
    expect((await look(first.paperworkId)).map(({ paperworkId }) => paperworkId)).toContain(second);
    // Neither the answer to the upload nor what the competitor may open says so.
    const own = must(
      await openOwnVersion(theirs.ports(), theirs.competitor, { paperworkId: second, number: 1 }),
    );
    for (const told of [sent, own]) {
      expect(JSON.stringify(told)).not.toContain(first.paperworkId);
      expect(JSON.stringify(told)).not.toMatch(/seen|another engine|also/i);
    }
    expect(
      await openPaperworkToCheck(theirs.ports(), theirs.competitor, { paperworkId: second }),
    ).toMatchObject({ failure: { name: 'absent' } });
  });
});
