import { fileActRequest } from '@/contracts/file/file';
import { fail } from '@/domain/result';
import { signInFirst, write } from '@/http/api';
import { withStore } from '@/services/file/with-store';
import { confirmCertificate } from '@/services/gauge/certificate/confirm-certificate';

export const POST = write(fileActRequest, async ({ ports, actor, body, params }) =>
  actor === null
    ? fail(signInFirst())
    : withStore(() =>
        confirmCertificate(ports, actor, {
          ...body,
          seriesId: params['series'] ?? '',
          gaugeId: params['gauge'] ?? '',
          fileId: params['file'] ?? '',
        }),
      ),
);
