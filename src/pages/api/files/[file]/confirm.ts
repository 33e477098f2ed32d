import { confirmUploadRequest } from '@/contracts/file/file';
import { fail } from '@/domain/result';
import { signInFirst, write } from '@/http/api';
import { confirmUpload } from '@/services/file/upload/confirm-upload';

export const POST = write(confirmUploadRequest, async ({ ports, actor, body, params }) =>
  actor === null
    ? fail(signInFirst())
    : confirmUpload(ports, actor, { ...body, fileId: params['file'] ?? '' }),
);
