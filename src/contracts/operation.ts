import type * as z from 'zod/mini';

/** One operation of the API, from which the OpenAPI document is made. */
export interface Operation {
  readonly method: 'get' | 'post' | 'put' | 'delete';
  /** With parameters in braces, `/api/files/{file}`. */
  readonly path: `/api/${string}`;
  readonly summary: string;
  readonly access: 'public' | 'signed-in';
  readonly body?: z.core.$ZodType;
  /** Query parameters, all of them text. */
  readonly query?: readonly {
    readonly name: string;
    readonly words: string;
    readonly required?: true;
  }[];
  /** Media type of an answer that is not JSON. */
  readonly answerType?: string;
  readonly answer?: z.core.$ZodType;
}
