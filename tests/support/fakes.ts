import type { Mailer, Objects, OutgoingMail } from '@/services/ports';

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
}

/** Keeps what would have been sent. */
export class SpyMailer implements Mailer {
  readonly sent: OutgoingMail[] = [];

  send(mail: OutgoingMail): Promise<void> {
    this.sent.push(mail);
    return Promise.resolve();
  }
}
