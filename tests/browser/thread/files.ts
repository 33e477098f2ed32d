import { createHash } from 'node:crypto';
import { GetObjectCommand, S3Client } from '@aws-sdk/client-s3';
import sharp from 'sharp';
import { positionsOf } from '@/domain/tappet/layout/bore-layout';
import { GENERIC_LAYOUTS } from '@/domain/tappet/layout/generic-layouts';
import { readProduct } from '../../support/product';

export interface Upload {
  readonly name: string;
  readonly mimeType: string;
  readonly buffer: Buffer;
}

export const sha256Of = (bytes: Uint8Array): string =>
  createHash('sha256').update(bytes).digest('hex');

const rack = (engine: string, fill: string) =>
  sharp(
    Buffer.from(
      `<svg xmlns="http://www.w3.org/2000/svg" width="1600" height="1200"><rect width="1600" height="1200" fill="${fill}"/>${Array.from(
        { length: 16 },
        (_, at) =>
          `<circle cx="${150 + (at % 8) * 185}" cy="${420 + Math.floor(at / 8) * 330}" r="70" fill="#8d9994" stroke="#12202b" stroke-width="8"/>`,
      ).join(
        '',
      )}<rect x="90" y="60" width="900" height="140" fill="#1b3a8c"/><text x="540" y="165" font-size="110" font-family="sans-serif" fill="#fff" text-anchor="middle">${engine}</text></svg>`,
    ),
  );

/** As a phone takes it: with the camera's name and the place where it stood. */
export const phonePicture = async (engine: string): Promise<Upload> => ({
  name: 'rack of lifters.jpg',
  mimeType: 'image/jpeg',
  buffer: await rack(engine, '#c9cfc7')
    .withExif({
      IFD0: { Model: 'Pocket camera' },
      IFD3: {
        GPSLatitudeRef: 'N',
        GPSLatitude: '41/1 30/1 1200/100',
        GPSLongitudeRef: 'W',
        GPSLongitude: '93/1 36/1 0/1',
      },
    })
    .jpeg({ quality: 82 })
    .toBuffer(),
});

/** As a program saves it. */
export const plainPicture = async (
  engine: string,
  name: string,
  fill: string,
): Promise<Upload> => ({
  name,
  mimeType: 'image/png',
  buffer: await rack(engine, fill).png().toBuffer(),
});

/** Whether a picture carries a directory of position data: EXIF's tag 0x8825 in either byte order. */
export const hasPosition = async (picture: Uint8Array): Promise<boolean> => {
  const { exif } = await sharp(picture).metadata();
  return (
    exif !== undefined &&
    (exif.includes('\x88\x25', 0, 'latin1') || exif.includes('\x25\x88', 0, 'latin1'))
  );
};

/** Everything a picture says beside its pixels. */
export const hasMetadata = async (picture: Uint8Array): Promise<boolean> => {
  const { exif, xmp, iptc } = await sharp(picture).metadata();
  return [exif, xmp, iptc].some((part) => part !== undefined);
};

export const LAYOUT = (() => {
  const [layout] = GENERIC_LAYOUTS;
  if (layout === undefined) throw new Error('There is no position map.');
  return layout;
})();

const csv = (name: string, lines: readonly string[]): Upload => ({
  name,
  mimeType: 'text/csv',
  buffer: Buffer.from(`${lines.join('\r\n')}\r\n`),
});

const letter = (valve: string): string => (valve === 'intake' ? 'I' : 'E');

/**
 * A builder's sheet in the builder's own words, sixteen rows, as such an engine would give it. One
 * cell of the body has a slip of the key in it.
 */
export const lifterSheet = (): Upload =>
  csv('lifters HB.csv', [
    'Bore,Lifter body (in),Foot (in),Lifter bore (in)',
    ...positionsOf(LAYOUT).map(({ cylinder, valve }, at) => {
      const body = 8422 + (at % 3);
      const written = cylinder === 5 && valve === 'intake' ? '0.84.41' : `0.${body}`;
      return `${cylinder}${letter(valve)},${written},0.${body + 2},0.${body + 16}`;
    }),
  ]);

/** Lift per valve, as a cam card gives it. */
export const camCard = (): Upload =>
  csv('cam HB.csv', [
    'Valve,Lift (in)',
    ...positionsOf(LAYOUT).map(
      ({ cylinder, valve }) =>
        `${cylinder}${letter(valve)},${valve === 'intake' ? '0.4581' : '0.4622'}`,
    ),
  ]);

/** Straight from the object store, past the product. */
export const storedObject = async (key: string): Promise<Buffer> => {
  const { env } = readProduct();
  const store = new S3Client({
    endpoint: env['S3_ENDPOINT'] ?? '',
    region: env['S3_REGION'] ?? '',
    forcePathStyle: true,
    credentials: {
      accessKeyId: env['S3_ACCESS_KEY_ID'] ?? '',
      secretAccessKey: env['S3_SECRET_ACCESS_KEY'] ?? '',
    },
  });
  try {
    const answer = await store.send(
      new GetObjectCommand({ Bucket: env['S3_BUCKET'] ?? '', Key: key }),
    );
    return Buffer.from((await answer.Body?.transformToByteArray()) ?? []);
  } finally {
    store.destroy();
  }
};
