/** One entry of a ZIP file by its central directory (APPNOTE.TXT 4.3.12). */
export interface ZipEntry {
  readonly name: string;
  readonly packed: number;
  /** What the directory says, which may be a lie. */
  readonly unpacked: number;
  /** 0 stored, 8 deflated. */
  readonly method: number;
  readonly encrypted: boolean;
  readonly crc: number;
  /** Of its local header. */
  readonly offset: number;
}

const END = 0x06054b50;
const ENTRY = 0x02014b50;
const MOST_COMMENT = 65_535;

/** The entries as the directory lists them, nothing unpacked; nothing where there is no sound directory. */
export const findZipEntries = (bytes: Uint8Array): readonly ZipEntry[] | undefined => {
  const view = new DataView(bytes.buffer, bytes.byteOffset, bytes.byteLength);
  const last = bytes.length - 22;
  let end = last;
  while (end >= 0 && end > last - MOST_COMMENT && view.getUint32(end, true) !== END) end -= 1;
  if (end < 0 || view.getUint32(end, true) !== END) return undefined;
  const count = view.getUint16(end + 10, true);
  let at = view.getUint32(end + 16, true);
  const entries: ZipEntry[] = [];
  for (let i = 0; i < count; i += 1) {
    if (at + 46 > bytes.length || view.getUint32(at, true) !== ENTRY) return undefined;
    const nameLength = view.getUint16(at + 28, true);
    const name = new TextDecoder().decode(bytes.subarray(at + 46, at + 46 + nameLength));
    entries.push({
      name,
      packed: view.getUint32(at + 20, true),
      unpacked: view.getUint32(at + 24, true),
      method: view.getUint16(at + 10, true),
      encrypted: (view.getUint16(at + 8, true) & 1) === 1,
      crc: view.getUint32(at + 16, true),
      offset: view.getUint32(at + 42, true),
    });
    at += 46 + nameLength + view.getUint16(at + 30, true) + view.getUint16(at + 32, true);
  }
  return entries;
};

/** The packed bytes of an entry, behind its local header; nothing where they do not lie in the file. */
export const findPacked = (bytes: Uint8Array, entry: ZipEntry): Uint8Array | undefined => {
  const view = new DataView(bytes.buffer, bytes.byteOffset, bytes.byteLength);
  if (entry.offset + 30 > bytes.length) return undefined;
  const names = view.getUint16(entry.offset + 26, true) + view.getUint16(entry.offset + 28, true);
  const start = entry.offset + 30 + names;
  return start + entry.packed > bytes.length
    ? undefined
    : bytes.subarray(start, start + entry.packed);
};
