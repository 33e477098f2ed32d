import { crc32, deflateRawSync } from 'node:zlib';
import type { ZipEntry } from './zip-directory';
import { findPacked } from './zip-directory';

/** A part to be written: as text, or packed as it lies in another file. */
export type ZipPart =
  | { readonly name: string; readonly text: string }
  | { readonly name: string; readonly from: Uint8Array; readonly entry: ZipEntry };

interface Packed {
  readonly name: Buffer;
  readonly method: number;
  readonly crc: number;
  readonly unpacked: number;
  readonly bytes: Uint8Array;
}

const packedOf = (part: ZipPart): Packed => {
  const name = Buffer.from(part.name);
  if ('text' in part) {
    const text = Buffer.from(part.text);
    const crc = crc32(text);
    return { name, method: 8, crc, unpacked: text.length, bytes: deflateRawSync(text) };
  }
  const { method, crc, unpacked } = part.entry;
  return {
    name,
    method,
    crc,
    unpacked,
    bytes: findPacked(part.from, part.entry) ?? Buffer.alloc(0),
  };
};

/** What local header and directory share: version, flags (names are UTF-8), method, 1980-01-01, sizes. */
const shared = ({ name, method, crc, unpacked, bytes }: Packed): Buffer => {
  const head = Buffer.alloc(26);
  head.writeUInt16LE(20, 0);
  head.writeUInt16LE(0x0800, 2);
  head.writeUInt16LE(method, 4);
  head.writeUInt16LE(0x21, 8);
  head.writeUInt32LE(crc, 10);
  head.writeUInt32LE(bytes.length, 14);
  head.writeUInt32LE(unpacked, 18);
  head.writeUInt16LE(name.length, 22);
  return head;
};

/** A ZIP file (APPNOTE.TXT 4.3) of these parts, in their order. */
export const writeZip = (parts: readonly ZipPart[]): Buffer => {
  const body: Uint8Array[] = [];
  const directory: Uint8Array[] = [];
  let offset = 0;
  for (const part of parts.map(packedOf)) {
    const head = shared(part);
    const place = Buffer.alloc(14);
    place.writeUInt32LE(offset, 10);
    body.push(Buffer.from('PK\u0003\u0004'), head, part.name, part.bytes);
    directory.push(Buffer.from('PK\u0001\u0002'), Buffer.from([20, 0]), head, place, part.name);
    offset += 30 + part.name.length + part.bytes.length;
  }
  const listed = Buffer.concat(directory);
  const end = Buffer.alloc(18);
  end.writeUInt16LE(parts.length, 4);
  end.writeUInt16LE(parts.length, 6);
  end.writeUInt32LE(listed.length, 8);
  end.writeUInt32LE(offset, 12);
  return Buffer.concat([...body, listed, Buffer.from('PK\u0005\u0006'), end]);
};
