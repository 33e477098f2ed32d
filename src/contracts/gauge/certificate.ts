import * as z from 'zod/mini';

export const expectCertificateRequest = z.strictObject({
  act: z.uuid('The act needs its identifier.'),
  fileId: z.uuid('This is no identifier.'),
  name: z.string().check(z.minLength(1), z.maxLength(200, 'At most 200 characters.')),
  type: z.string().check(z.maxLength(120)),
  bytes: z.int().check(z.gte(1, 'The file is empty.')),
});
