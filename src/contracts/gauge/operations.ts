import { expectUploadResponse, fileActRequest, keptFile } from '../file/file';
import type { Operation } from '../operation';
import { expectCertificateRequest } from './certificate';
import { gaugeAnswer, gaugeRequest } from './gauge';

export const operations: readonly Operation[] = [
  {
    method: 'post',
    path: '/api/gauges/{series}',
    summary: 'Enter a gauge in the register, or change its figures.',
    access: 'signed-in',
    body: gaugeRequest,
    answer: gaugeAnswer,
  },
  {
    method: 'post',
    path: '/api/gauges/{series}/{gauge}/certificates',
    summary:
      'Announce the file of a gauge’s certificate; its bytes go straight to the object store.',
    access: 'signed-in',
    body: expectCertificateRequest,
    answer: expectUploadResponse,
  },
  {
    method: 'post',
    path: '/api/gauges/{series}/{gauge}/certificates/{file}',
    summary: 'Have the certificate read back and hashed, so that the register can name it.',
    access: 'signed-in',
    body: fileActRequest,
    answer: keptFile,
  },
];
