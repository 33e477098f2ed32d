import { fromWindows1252 } from './csv/windows-1252';

/** UTF-8 or UTF-16 by their marks, UTF-8 without one, else the code page that spreadsheets of the West write. */
export const readText = (bytes: Uint8Array): string => {
  const [a, b, c] = bytes;
  if (a === 0xff && b === 0xfe) return new TextDecoder('utf-16le').decode(bytes);
  if (a === 0xfe && b === 0xff) return new TextDecoder('utf-16be').decode(bytes);
  const marked = a === 0xef && b === 0xbb && c === 0xbf;
  try {
    return new TextDecoder('utf-8', { fatal: true }).decode(marked ? bytes.subarray(3) : bytes);
  } catch {
    return fromWindows1252(bytes);
  }
};
