import sharp from 'sharp';
import { expect, test } from 'vitest';
import { decodeHeic, HEIC_BOUNDS, type HeicBounds } from '@/adapters/images/heic';
import { images } from '@/adapters/images/sharp';
import { heicPixels } from '@/domain/paperwork/file/heic-size';
import { inspectFile } from '@/services/file/content/inspect-file';
import { PREVIEW_WIDTHS } from '@/services/file/make-previews';
import { heicFixture } from '../../support/hostile/pictures';

const rack = heicFixture('rack');
const all = { pixels: 50_000_000, wantsPixels: true };

test('a HEIC photograph as phones write it is taken, whatever it was announced as', async () => {
  expect(await inspectFile(images, 'photograph', rack)).toEqual({
    ok: true,
    value: { type: 'image/heic', width: 1600, height: 1200 },
  });
  expect(heicPixels(rack)).toBe(1600 * 1200);
});

test('its previews show the picture and carry nothing else: no position, no camera', async () => {
  // The fixture does hold a position: tag 0x8825 (Exif 2.32, 4.6.3), in either byte order.
  expect(
    Math.max(rack.indexOf('\x25\x88', 0, 'latin1'), rack.indexOf('\x88\x25', 0, 'latin1')),
  ).toBeGreaterThan(0);
  expect(rack.includes('Pocket camera')).toBe(true);
  const previews = await images.previews(rack, PREVIEW_WIDTHS);
  expect(previews.map(({ width }) => width)).toEqual([160, 640, 1600]);
  for (const { width, bytes } of previews) {
    const facts = await sharp(bytes).metadata();
    expect([facts.format, facts.width, facts.height]).toEqual(['jpeg', width, width * 0.75]);
    expect([facts.exif, facts.xmp, facts.iptc]).toEqual([undefined, undefined, undefined]);
    expect(Buffer.from(bytes).includes('Pocket camera')).toBe(false);
  }
  // The blue plate of the drawing stands where it was drawn.
  const { data } = await sharp(previews[1]?.bytes)
    .extract({ left: 200, top: 50, width: 1, height: 1 })
    .raw()
    .toBuffer({ resolveWithObject: true });
  const drawn = [0x1b, 0x3a, 0x8c];
  for (const [at, value] of drawn.entries())
    expect(Math.abs((data[at] ?? 0) - value)).toBeLessThan(12);
});

test('the decoder ends where its memory, its time or the pixels allowed do not suffice', async () => {
  const large = heicFixture('48-megapixels');
  const dimensions = { ...all, wantsPixels: false };
  const within = async (
    bytes: Uint8Array,
    bounds: Partial<HeicBounds> = {},
    pixels = all.pixels,
  ): Promise<boolean> =>
    (await decodeHeic(bytes, { ...dimensions, pixels }, { ...HEIC_BOUNDS, ...bounds })) !==
    undefined;
  expect(await within(rack)).toBe(true);
  expect(await within(rack, {}, 1_000_000)).toBe(false);
  expect(await within(rack, { milliseconds: 1 })).toBe(false);
  expect(await within(large)).toBe(true);
  expect(await within(large, { memory: 200_000_000 })).toBe(false);
  expect(await within(new Uint8Array(40))).toBe(false);
  // And it is as good as before.
  expect(await decodeHeic(rack, dimensions)).toEqual({ width: 1600, height: 1200 });
});
