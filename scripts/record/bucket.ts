import {
  GetObjectCommand,
  ListObjectsV2Command,
  PutObjectCommand,
  S3Client,
} from '@aws-sdk/client-s3';
import type { Config } from '@/config';

export interface Bucket {
  /** Every key but those of uploads that were never confirmed. */
  keys(): Promise<readonly string[]>;
  read(key: string): Promise<{ readonly bytes: Uint8Array; readonly type: string }>;
  write(key: string, bytes: Uint8Array, type: string): Promise<void>;
  close(): void;
}

/** The whole bucket, as a backup sees it. */
export const openBucket = (config: Config['objects']): Bucket => {
  const client = new S3Client({
    endpoint: config.endpoint,
    region: config.region,
    forcePathStyle: true,
    requestChecksumCalculation: 'WHEN_REQUIRED',
    responseChecksumValidation: 'WHEN_REQUIRED',
    credentials: { accessKeyId: config.accessKeyId, secretAccessKey: config.secretAccessKey },
  });
  const Bucket = config.bucket;
  return {
    keys: async () => {
      const keys: string[] = [];
      let after: string | undefined;
      do {
        const page = await client.send(
          new ListObjectsV2Command({ Bucket, ...(after && { ContinuationToken: after }) }),
        );
        keys.push(...(page.Contents ?? []).flatMap(({ Key }) => Key ?? []));
        after = page.NextContinuationToken;
      } while (after !== undefined);
      return keys.filter((key) => !key.startsWith('uploads/')).sort();
    },
    read: async (key) => {
      const answer = await client.send(new GetObjectCommand({ Bucket, Key: key }));
      if (answer.Body === undefined) throw new Error(`The object ${key} has no body.`);
      const bytes = await answer.Body.transformToByteArray();
      return { bytes, type: answer.ContentType ?? 'application/octet-stream' };
    },
    write: async (key, bytes, type) => {
      await client.send(
        new PutObjectCommand({
          Bucket,
          Key: key,
          Body: bytes,
          ContentType: type,
          ContentLength: bytes.length,
        }),
      );
    },
    close: () => client.destroy(),
  };
};
