import { deflateSync } from 'node:zlib';

/** A PDF of these objects. */
export const pdf = (...objects: readonly (string | Buffer)[]): Buffer =>
  Buffer.concat([
    Buffer.from('%PDF-1.7\n'),
    ...objects.map((one, at) =>
      Buffer.concat([
        Buffer.from(`${at + 1} 0 obj\n`),
        typeof one === 'string' ? Buffer.from(one, 'latin1') : one,
        Buffer.from('\nendobj\n'),
      ]),
    ),
    Buffer.from('trailer\n<< /Root 1 0 R >>\nstartxref\n0\n%%EOF\n'),
  ]);

/** Objects packed into a stream (ISO 32000-2, 7.5.7). */
export const packedObjects = (content: Uint8Array, filter = '/FlateDecode'): Buffer =>
  Buffer.concat([
    Buffer.from(`<< /Type /ObjStm /N 1 /First 4 /Filter ${filter} >>\nstream\n`),
    deflateSync(content),
    Buffer.from('\nendstream'),
  ]);
