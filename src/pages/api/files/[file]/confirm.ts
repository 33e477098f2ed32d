import { fileActRequest } from '@/contracts/file/file';
import { fail } from '@/domain/result';
import { signInFirst, write } from '@/http/api';
import { confirmUpload } from '@/services/file/confirm-upload';

export const POST = write(fileActRequest, async ({ ports, actor, body, params }) =>
  actor === null
    ? fail(signInFirst())
    : confirmUpload(ports, actor, { act: body.act, fileId: params['file'] ?? '' }),
);
