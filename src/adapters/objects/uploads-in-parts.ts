import {
  AbortMultipartUploadCommand,
  CompleteMultipartUploadCommand,
  CreateMultipartUploadCommand,
  type S3Client,
  UploadPartCommand,
} from '@aws-sdk/client-s3';
import { getSignedUrl } from '@aws-sdk/s3-request-presigner';
import type { UploadsInParts } from '@/services/ports';
import { reach } from './reach';

/** Names of the store's answers to parts that are missing, too small, or in the wrong order. */
const NOT_ALL_THERE = new Set(['InvalidPart', 'EntityTooSmall', 'InvalidPartOrder']);
/** The upload was joined or dropped before: whoever asks looks for the object next. */
const GONE = new Set(['NoSuchUpload', 'NoSuchKey', 'NotFound']);

const nameOf = (error: unknown): string => (error as { readonly name?: string }).name ?? '';

/** `inner` is how this server reaches the store, `outer` how the browser does. */
export const uploadsInParts = (
  inner: S3Client,
  outer: S3Client,
  bucket: string,
  seconds: number,
): UploadsInParts => {
  const at = (key: string, uploadId: string) => ({ Bucket: bucket, Key: key, UploadId: uploadId });
  return {
    begin: async (key, type) => {
      const { UploadId } = await reach(() =>
        inner.send(
          new CreateMultipartUploadCommand({ Bucket: bucket, Key: key, ContentType: type }),
        ),
      );
      if (UploadId === undefined) throw new Error(`The store gave the upload of ${key} no name.`);
      return UploadId;
    },
    presign: (key, uploadId, part, bytes) =>
      getSignedUrl(
        outer,
        new UploadPartCommand({ ...at(key, uploadId), PartNumber: part, ContentLength: bytes }),
        { expiresIn: seconds, signableHeaders: new Set(['content-length']) },
      ),
    join: async (key, uploadId, parts) => {
      const Parts = parts.map(({ number, tag }) => ({ PartNumber: number, ETag: tag }));
      try {
        await reach(() =>
          inner.send(
            new CompleteMultipartUploadCommand({
              ...at(key, uploadId),
              MultipartUpload: { Parts },
            }),
          ),
        );
        return true;
      } catch (error) {
        if (GONE.has(nameOf(error))) return true;
        if (NOT_ALL_THERE.has(nameOf(error))) return false;
        throw error;
      }
    },
    drop: async (key, uploadId) => {
      try {
        await reach(() => inner.send(new AbortMultipartUploadCommand(at(key, uploadId))));
      } catch (error) {
        // Some stores cannot forget an upload; their owner lets unfinished ones expire.
        if (!GONE.has(nameOf(error)) && nameOf(error) !== 'MethodNotAllowed') throw error;
      }
    },
  };
};
