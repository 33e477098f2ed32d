import * as z from 'zod/mini';

export const expectPhotographRequest = z.strictObject({
  act: z.uuid('The act needs its identifier.'),
  fileId: z.uuid('This is no identifier.'),
  /** What it shows: the bore's name, for example. */
  item: z.string().check(z.minLength(1, 'Say what it shows.'), z.maxLength(120)),
  name: z.string().check(z.minLength(1), z.maxLength(200, 'At most 200 characters.')),
  type: z.string().check(z.maxLength(120)),
  bytes: z.int().check(z.gte(1, 'The file is empty.')),
});
