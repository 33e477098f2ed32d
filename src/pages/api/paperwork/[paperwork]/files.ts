import { expectUploadRequest } from '@/contracts/file/file';
import { fail } from '@/domain/result';
import { signInFirst, write } from '@/http/api';
import { expectUpload } from '@/services/file/upload/expect-upload';

export const POST = write(expectUploadRequest, async ({ ports, actor, body, params }) =>
  actor === null
    ? fail(signInFirst())
    : expectUpload(ports, actor, { ...body, paperworkId: params['paperwork'] ?? '' }),
);
