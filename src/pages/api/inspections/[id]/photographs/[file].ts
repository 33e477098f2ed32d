import { fileActRequest } from '@/contracts/file/file';
import { fail } from '@/domain/result';
import { signInFirst, write } from '@/http/api';
import { withStore } from '@/services/file/with-store';
import { confirmPhotograph } from '@/services/inspection/photograph/confirm-photograph';

export const POST = write(fileActRequest, async ({ ports, actor, body, params }) =>
  actor === null
    ? fail(signInFirst())
    : withStore(() =>
        confirmPhotograph(ports, actor, {
          ...body,
          inspectionId: params['id'] ?? '',
          fileId: params['file'] ?? '',
        }),
      ),
);
