import { rememberColumnsRequest } from '@/contracts/paperwork/sheet';
import { fail } from '@/domain/result';
import { signInFirst, write } from '@/http/api';
import { rememberColumns } from '@/services/paperwork/sheet/file/remember-columns';

export const POST = write(rememberColumnsRequest, async ({ ports, actor, body, params }) =>
  actor === null
    ? fail(signInFirst())
    : rememberColumns(ports, actor, { ...body, fileId: params['file'] ?? '' }),
);
