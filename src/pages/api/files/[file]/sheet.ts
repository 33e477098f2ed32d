import { readSheetRequest } from '@/contracts/paperwork/sheet';
import { fail } from '@/domain/result';
import { signInFirst, write } from '@/http/api';
import { readSheetFile } from '@/services/paperwork/read-sheet-file';

export const POST = write(readSheetRequest, async ({ ports, actor, body, params }) =>
  actor === null
    ? fail(signInFirst())
    : readSheetFile(ports, actor, { ...body, fileId: params['file'] ?? '' }),
);
