import jsqr from 'jsqr';
import type { Locator } from 'playwright-core';
import sharp from 'sharp';

/** What a phone's camera would read off this part of the screen. */
export async function readCode(code: Locator): Promise<string> {
  const picture = await code.screenshot();
  const { data, info } = await sharp(picture)
    .ensureAlpha()
    .raw()
    .toBuffer({ resolveWithObject: true });
  const found = jsqr(new Uint8ClampedArray(data), info.width, info.height);
  if (found === null) throw new Error(`No code can be read in ${info.width} × ${info.height}.`);
  return found.data;
}
