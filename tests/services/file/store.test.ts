import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { openObjects } from '@/adapters/objects/s3';
import { PART_BYTES, partSizes } from '@/domain/paperwork/file/limits';
import { StoreUnreachable } from '@/services/ports';
import type { Running } from '../../../scripts/local/listen.mjs';
import { objectStoreKeys, startObjectStore } from '../../../scripts/local/object-store.mjs';
import { startStrictStore } from '../../support/strict-store';

let folder: string;
let store: Running;
let strict: Awaited<ReturnType<typeof startStrictStore>>;
let objects: ReturnType<typeof openObjects>;
let now = new Date();

const config = (endpoint: string, publicEndpoint: string) => ({
  ...objectStoreKeys,
  endpoint,
  publicEndpoint,
  region: 'us-east-1',
  bucket: 'tagwire',
});

beforeAll(async () => {
  folder = mkdtempSync(join(tmpdir(), 'tagwire-store-'));
  store = await startObjectStore({
    port: 0,
    folder,
    bucket: 'tagwire',
    origins: ['http://127.0.0.1:1'],
  });
  strict = await startStrictStore(store.url, objectStoreKeys.secretAccessKey, () => now);
  objects = openObjects(config(store.url, strict.url));
});
afterAll(async () => {
  objects.close();
  await strict.stop();
  await store.stop();
  rmSync(folder, { recursive: true, force: true });
});

const put = async (url: string, body: Uint8Array | string, type?: string): Promise<number> => {
  const headers = type === undefined ? {} : { 'content-type': type };
  const response = await fetch(url, { method: 'PUT', body: Buffer.from(body as string), headers });
  await response.arrayBuffer();
  return response.status;
};

describe('a signed address, at a store that checks it', () => {
  it('takes exactly what was announced', async () => {
    const url = await objects.presignPut('uploads/a', 'image/jpeg', 5);
    expect(await put(url, 'abcde', 'image/jpeg')).toBe(200);
    expect(await objects.findHead('uploads/a')).toEqual({ bytes: 5 });
  });

  it.each([
    ['more bytes', 'abcdefgh', 'image/jpeg'],
    ['fewer bytes', 'abc', 'image/jpeg'],
    ['another type', 'abcde', 'text/html'],
  ])('refuses %s than announced', async (_, body, type) => {
    const url = await objects.presignPut('uploads/b', 'image/jpeg', 5);
    expect(await put(url, body, type)).toBe(403);
    expect(await objects.findHead('uploads/b')).toBeUndefined();
  });

  it('refuses another key, another signature, none, and one that is too old', async () => {
    const url = await objects.presignPut('uploads/c', 'image/jpeg', 5);
    const other = url.replace('uploads/c', 'uploads/d');
    const forged = url.replace(/X-Amz-Signature=./, 'X-Amz-Signature=g');
    for (const wrong of [other, forged, url.split('?')[0] ?? ''])
      expect(await put(wrong, 'abcde', 'image/jpeg')).toBe(403);
    now = new Date(now.getTime() + 601_000);
    expect(await put(url, 'abcde', 'image/jpeg')).toBe(403);
    now = new Date();
    expect(await put(url, 'abcde', 'image/jpeg')).toBe(200);
  });
});

describe('an upload in parts', () => {
  const bytes = Buffer.alloc(2 * PART_BYTES + 1_000, 'tagwire ');
  const send = async (uploadId: string, number: number): Promise<string> => {
    const from = (number - 1) * PART_BYTES;
    const body = bytes.subarray(from, from + PART_BYTES);
    const url = await objects.uploads.presign('uploads/parts', uploadId, number, body.length);
    const response = await fetch(url, { method: 'PUT', body });
    expect(response.status).toBe(200);
    return response.headers.get('etag') ?? '';
  };

  it('goes on where it was cut, in any order, and is one object at the end', async () => {
    expect(partSizes(bytes.length)).toEqual([PART_BYTES, PART_BYTES, 1_000]);
    const uploadId = await objects.uploads.begin('uploads/parts', 'image/jpeg');
    const third = await send(uploadId, 3);
    const first = await send(uploadId, 1);
    await send(uploadId, 2);
    // Sent again after its answer was lost: the same part.
    const second = await send(uploadId, 2);
    const parts = [first, second, third].map((tag, at) => ({ number: at + 1, tag }));
    expect(await objects.findHead('uploads/parts')).toBeUndefined();
    expect(await objects.uploads.join('uploads/parts', uploadId, parts)).toBe(true);
    expect(
      Buffer.compare(Buffer.from(await objects.read('uploads/parts', 20_000_000)), bytes),
    ).toBe(0);
    await objects.uploads.drop('uploads/parts', uploadId);
  });

  it('refuses a part of another length', async () => {
    const uploadId = await objects.uploads.begin('uploads/other', 'image/jpeg');
    const url = await objects.uploads.presign('uploads/other', uploadId, 1, 5);
    expect(await put(url, 'abcdefgh')).toBe(403);
    expect(await put(url, 'abcde')).toBe(200);
  });
});

it('a store that is not there is told apart from an object that is not', async () => {
  const gone = openObjects(config('http://127.0.0.1:9', 'http://127.0.0.1:9'));
  await expect(gone.read('a', 10)).rejects.toBeInstanceOf(StoreUnreachable);
  await expect(gone.findHead('a')).rejects.toBeInstanceOf(StoreUnreachable);
  await expect(gone.write('a', new Uint8Array(1), 'a/b')).rejects.toBeInstanceOf(StoreUnreachable);
  await expect(gone.uploads.begin('a', 'a/b')).rejects.toBeInstanceOf(StoreUnreachable);
  gone.close();
  expect(await objects.findHead('uploads/none')).toBeUndefined();
  await expect(objects.read('uploads/none', 10)).rejects.not.toBeInstanceOf(StoreUnreachable);
});
