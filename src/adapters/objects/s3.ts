import {
  DeleteObjectCommand,
  GetObjectCommand,
  HeadObjectCommand,
  NotFound,
  PutObjectCommand,
  S3Client,
} from '@aws-sdk/client-s3';
import { getSignedUrl } from '@aws-sdk/s3-request-presigner';
import type { Objects, UploadsInParts } from '@/services/ports';
import { reach } from './reach';
import { uploadsInParts } from './uploads-in-parts';

export interface ObjectStoreConfig {
  readonly endpoint: string;
  /** Where the browser reaches the same store. */
  readonly publicEndpoint: string;
  readonly region: string;
  readonly bucket: string;
  readonly accessKeyId: string;
  readonly secretAccessKey: string;
}

export const PUT_SECONDS = 600;

const client = (config: ObjectStoreConfig, endpoint: string): S3Client =>
  new S3Client({
    endpoint,
    region: config.region,
    forcePathStyle: true,
    // With the SDK's default, streamed uploads are stored damaged by some stores and answered 200.
    requestChecksumCalculation: 'WHEN_REQUIRED',
    responseChecksumValidation: 'WHEN_REQUIRED',
    // Whoever waits for a file that does not come is told so.
    requestHandler: { connectionTimeout: 3_000, requestTimeout: 20_000 },
    credentials: { accessKeyId: config.accessKeyId, secretAccessKey: config.secretAccessKey },
  });

export interface OpenedStore extends Objects {
  readonly uploads: UploadsInParts;
  close(): void;
}

export const openObjects = (config: ObjectStoreConfig): OpenedStore => {
  const inner = client(config, config.endpoint);
  const outer = client(config, config.publicEndpoint);
  const at = (key: string) => ({ Bucket: config.bucket, Key: key });
  return {
    uploads: uploadsInParts(inner, outer, config.bucket, PUT_SECONDS),
    presignPut: (key, type, bytes) =>
      getSignedUrl(
        outer,
        new PutObjectCommand({ ...at(key), ContentType: type, ContentLength: bytes }),
        { expiresIn: PUT_SECONDS, signableHeaders: new Set(['content-type', 'content-length']) },
      ),
    findHead: async (key) => {
      try {
        const head = await reach(() => inner.send(new HeadObjectCommand(at(key))));
        return { bytes: head.ContentLength ?? 0 };
      } catch (error) {
        if (error instanceof NotFound) return undefined;
        throw error;
      }
    },
    read: (key, limit) =>
      reach(async () => {
        const answer = await inner.send(new GetObjectCommand(at(key)));
        if (answer.Body === undefined) throw new Error(`The object ${key} has no body.`);
        const parts: Uint8Array[] = [];
        let total = 0;
        for await (const part of answer.Body as AsyncIterable<Uint8Array>) {
          total += part.length;
          if (total > limit) throw new Error(`The object ${key} is larger than ${limit} bytes.`);
          parts.push(part);
        }
        return Buffer.concat(parts);
      }),
    write: async (key, body, type) => {
      const object = { ...at(key), Body: body, ContentType: type, ContentLength: body.length };
      await reach(() => inner.send(new PutObjectCommand(object)));
    },
    remove: async (key) => {
      await reach(() => inner.send(new DeleteObjectCommand(at(key))));
    },
    close: () => {
      inner.destroy();
      outer.destroy();
    },
  };
};
