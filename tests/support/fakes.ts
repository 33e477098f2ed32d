import type { Mailer, Objects, OutgoingMail, UploadsInParts } from '@/services/ports';

/** An object store in memory, with the same refusals as the real one. */
export class FakeObjects implements Objects {
  readonly stored = new Map<string, { readonly bytes: Uint8Array; readonly type: string }>();

  presignPut(key: string, type: string, bytes: number): Promise<string> {
    return Promise.resolve(`memory://${key}?type=${encodeURIComponent(type)}&bytes=${bytes}`);
  }
  findHead(key: string): Promise<{ readonly bytes: number } | undefined> {
    const found = this.stored.get(key);
    return Promise.resolve(found && { bytes: found.bytes.length });
  }
  read(key: string, limit: number): Promise<Uint8Array> {
    const found = this.stored.get(key);
    if (found === undefined) return Promise.reject(new Error(`There is no object ${key}.`));
    return found.bytes.length > limit
      ? Promise.reject(new Error(`The object ${key} is larger than ${limit} bytes.`))
      : Promise.resolve(found.bytes);
  }
  write(key: string, bytes: Uint8Array, type: string): Promise<void> {
    this.stored.set(key, { bytes, type });
    return Promise.resolve();
  }
  remove(key: string): Promise<void> {
    this.stored.delete(key);
    return Promise.resolve();
  }

  /** Parts that were put, by upload and number. */
  readonly parts = new Map<string, Uint8Array>();
  readonly uploads: UploadsInParts = {
    begin: (key) => Promise.resolve(`upload-of-${key}`),
    presign: (_, uploadId, part, bytes) =>
      Promise.resolve(`memory://${uploadId}?part=${part}&bytes=${bytes}`),
    join: async (key, uploadId, parts) => {
      const found = parts.map(({ number }) => this.parts.get(`${uploadId} ${number}`));
      if (found.includes(undefined)) return this.stored.has(key);
      await this.write(key, Buffer.concat(found as Uint8Array[]), 'application/octet-stream');
      return true;
    },
    drop: async (_, uploadId) => {
      for (const name of [...this.parts.keys()])
        if (name.startsWith(`${uploadId} `)) this.parts.delete(name);
    },
  };
}

/** Keeps what would have been sent. */
export class SpyMailer implements Mailer {
  readonly sent: OutgoingMail[] = [];
  /** What the next sendings meet instead, one each. */
  readonly troubles: Error[] = [];

  send(mail: OutgoingMail): Promise<string> {
    const trouble = this.troubles.shift();
    if (trouble !== undefined) return Promise.reject(trouble);
    this.sent.push(mail);
    return Promise.resolve('250 2.0.0 taken');
  }
}
