/** What the code page has at 0x80 to 0x9F (WHATWG Encoding, index windows-1252); elsewhere it is ISO 8859-1. */
const HIGH = '€\u0081‚ƒ„…†‡ˆ‰Š‹Œ\u008dŽ\u008f\u0090‘’“”•–—˜™š›œ\u009džŸ';

// The platform's own decoder takes these for control characters in some of its versions.
export const fromWindows1252 = (bytes: Uint8Array): string =>
  Buffer.from(bytes)
    .toString('latin1')
    .replace(/[\u0080-\u009f]/g, (char) => HIGH[char.charCodeAt(0) - 0x80] ?? char);

const byteOf = (char: string): number => {
  const at = HIGH.indexOf(char);
  if (at >= 0) return 0x80 + at;
  const code = char.codePointAt(0) ?? 0;
  return code < 0x100 ? code : 0x3f;
};

/** What the code page lacks becomes a question mark. */
export const inWindows1252 = (text: string): Uint8Array => Uint8Array.from([...text].map(byteOf));
