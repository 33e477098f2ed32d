const at32 = (bytes: Uint8Array, at: number): number =>
  (bytes[at] ?? 0) * 2 ** 24 +
  (bytes[at + 1] ?? 0) * 65_536 +
  (bytes[at + 2] ?? 0) * 256 +
  (bytes[at + 3] ?? 0);

const nameAt = (bytes: Uint8Array, at: number): string =>
  String.fromCharCode(...bytes.subarray(at, at + 4));

/** Where boxes are looked for, and how far their own fields reach before the next box begins. */
const INSIDE: Readonly<Record<string, number>> = { meta: 4, iprp: 0, ipco: 0 };
const MOST_BOXES = 4_000;

/**
 * The most pixels that any picture in a HEIC file says it has, without decoding anything; nothing
 * where none says so. Image spatial extents, `ispe` (ISO/IEC 23008-12, 6.5.3), in the boxes of
 * ISO/IEC 14496-12.
 */
export const heicPixels = (bytes: Uint8Array): number | undefined => {
  let most: number | undefined;
  let seen = 0;
  const walk = (from: number, to: number): void => {
    let at = from;
    while (at + 8 <= to && seen < MOST_BOXES) {
      seen += 1;
      const stated = at32(bytes, at);
      const name = nameAt(bytes, at + 4);
      const head = stated === 1 ? 16 : 8;
      const size = stated === 1 ? at32(bytes, at + 8) * 2 ** 32 + at32(bytes, at + 12) : stated;
      const end = size === 0 ? to : at + size;
      if (size !== 0 && size < head) return;
      const inside = INSIDE[name];
      if (inside !== undefined) walk(at + head + inside, Math.min(end, to));
      if (name === 'ispe' && at + head + 12 <= to)
        most = Math.max(most ?? 0, at32(bytes, at + head + 4) * at32(bytes, at + head + 8));
      at = end;
    }
  };
  walk(0, bytes.length);
  return most;
};
