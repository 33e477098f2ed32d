import { fileActRequest } from '@/contracts/file/file';
import { fail } from '@/domain/result';
import { signInFirst, write } from '@/http/api';
import { removeFile } from '@/services/file/remove-file';

export const POST = write(fileActRequest, async ({ ports, actor, body, params }) =>
  actor === null
    ? fail(signInFirst())
    : removeFile(ports, actor, { act: body.act, fileId: params['file'] ?? '' }),
);
