import * as z from 'zod/mini';
import type { Operation } from '../operation';

export const operations: readonly Operation[] = [
  {
    method: 'post',
    path: '/api/mail/bounces',
    summary:
      'Hand in a report of an undelivered message as it came (RFC 3464, message/rfc822), with the key of MAIL_BOUNCE_KEY as bearer',
    access: 'public',
    answer: z.strictObject({ noted: z.boolean() }),
  },
];
