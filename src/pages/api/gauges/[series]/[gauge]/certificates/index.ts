import { expectCertificateRequest } from '@/contracts/gauge/certificate';
import { fail } from '@/domain/result';
import { signInFirst, write } from '@/http/api';
import { expectCertificate } from '@/services/gauge/certificate/expect-certificate';

export const POST = write(expectCertificateRequest, async ({ ports, actor, body, params }) =>
  actor === null
    ? fail(signInFirst())
    : expectCertificate(ports, actor, {
        ...body,
        seriesId: params['series'] ?? '',
        gaugeId: params['gauge'] ?? '',
      }),
);
