import jsqr from 'jsqr';
import { renderToStaticMarkup } from 'react-dom/server';
import sharp from 'sharp';
import { describe, expect, it } from 'vitest';
import { Code, ReadingCodes } from '@/components/witness/ReadingCodes';
import { CODE_BYTES, joinCodes, splitIntoCodes } from '@/domain/inspection/witness/readings-codes';

const lines = Array.from(
  { length: 96 },
  (_, at) =>
    `${(at % 8) + 1} ${at % 2 === 0 ? 'intake' : 'exhaust'}: 0.8423 0.8424 -0.0016 0.84${at}`,
);
const codes = splitIntoCodes(lines, { carNumber: '12J', chain: '9f3a12cd' });

/** Drawn `width` pixels across, as a screen or a printer of that fineness shows it, and read off it. */
const read = async (text: string, width: number): Promise<string | undefined> => {
  const svg = renderToStaticMarkup(<Code text={text} label="Code" />).replace(
    '<svg',
    '<svg xmlns="http://www.w3.org/2000/svg"',
  );
  const { data, info } = await sharp(Buffer.from(svg))
    .resize(width)
    .ensureAlpha()
    .raw()
    .toBuffer({ resolveWithObject: true });
  return jsqr(new Uint8ClampedArray(data), info.width, info.height)?.data;
};

describe('the readings’ codes', () => {
  it.each([
    ['on a tablet, 480 px across', 480],
    ['on paper, 70 mm at 150 dots an inch', 413],
  ])('are read back whole %s', async (_, width) => {
    expect(codes.length).toBeGreaterThan(5);
    const seen = await Promise.all(codes.map((code) => read(code, width)));
    expect(joinCodes(seen.map((text) => text ?? 'unread'))).toEqual(lines);
  });

  it('are full: none is made where one before it has room for its first line', () => {
    const size = (text: string) => new TextEncoder().encode(text).length;
    for (const [at, code] of codes.slice(0, -1).entries()) {
      const [, first = ''] = codes[at + 1]?.split('\n') ?? [];
      expect(size(code) + 1 + size(first) + 2).toBeGreaterThan(CODE_BYTES);
    }
  });

  it('show one at a time, with what it says, and the way to the next', () => {
    const markup = renderToStaticMarkup(<ReadingCodes codes={codes} />);
    expect(markup).toContain(`Code 1 of ${codes.length}`);
    expect(markup.match(/<svg/g)).toHaveLength(1);
    expect(markup).toContain('Next code');
    expect(renderToStaticMarkup(<ReadingCodes codes={codes.slice(0, 1)} />)).not.toContain(
      'Next code',
    );
  });
});
