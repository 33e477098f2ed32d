import type * as z from 'zod/mini';

/** One operation of the API, from which the OpenAPI document is made. */
export interface Operation {
  readonly method: 'get' | 'post' | 'put' | 'delete';
  /** With parameters in braces, `/api/files/{file}`. */
  readonly path: `/api/${string}`;
  readonly summary: string;
  readonly access: 'public' | 'signed-in';
  readonly body?: z.core.$ZodType;
  readonly answer?: z.core.$ZodType;
}
