import * as z from 'zod/mini';
import type { Operation } from './operation';

const problemDetails = z.object({
  type: z.string(),
  title: z.string(),
  status: z.int(),
  detail: z.string(),
  errors: z.optional(z.array(z.object({ pointer: z.string(), detail: z.string() }))),
});

type Schema = Record<string, unknown>;

/** JSON Schema of what is sent (`input`) or of what comes back (`output`). */
const schemaOf = (schema: z.core.$ZodType, io: 'input' | 'output'): Schema => {
  const made = z.toJSONSchema(schema, { io, unrepresentable: 'any' }) as Schema;
  const { $schema: _dialect, ...rest } = made;
  return rest;
};

const operationOf = (operation: Operation): Schema => {
  const inPath = [...operation.path.matchAll(/\{(\w+)\}/g)].map(([, name]) => ({
    name,
    in: 'path',
    required: true,
    schema: { type: 'string' },
  }));
  const inQuery = (operation.query ?? []).map(({ name, words, required = false }) => ({
    name,
    in: 'query',
    description: words,
    required,
    schema: { type: 'string' },
  }));
  const parameters = [...inPath, ...inQuery];
  const refusal = {
    description: 'Problem details (RFC 9457); `errors` name fields by JSON Pointer (RFC 6901).',
    content: { 'application/problem+json': { schema: { $ref: '#/components/schemas/Problem' } } },
  };
  return {
    summary: operation.summary,
    ...(parameters.length > 0 ? { parameters } : {}),
    ...(operation.body
      ? {
          requestBody: {
            required: true,
            content: { 'application/json': { schema: schemaOf(operation.body, 'input') } },
          },
        }
      : {}),
    responses: {
      200: {
        description: 'Done',
        ...(operation.answer
          ? { content: { 'application/json': { schema: schemaOf(operation.answer, 'output') } } }
          : {}),
        ...(operation.answerType === undefined
          ? {}
          : { content: { [operation.answerType]: { schema: { type: 'string' } } } }),
      },
      default: refusal,
    },
    security: operation.access === 'public' ? [] : [{ session: [] }],
  };
};

/** The OpenAPI 3.1 document of the given operations. */
export const openApi = (operations: readonly Operation[], publicUrl: string): Schema => {
  const paths: Record<string, Schema> = {};
  for (const operation of operations) {
    paths[operation.path] = {
      ...paths[operation.path],
      [operation.method]: operationOf(operation),
    };
  }
  return {
    openapi: '3.1.0',
    info: { title: 'Tagwire', version: '1' },
    servers: [{ url: publicUrl }],
    paths,
    components: {
      schemas: { Problem: schemaOf(problemDetails, 'output') },
      securitySchemes: { session: { type: 'apiKey', in: 'cookie', name: 'tagwire_session' } },
    },
  };
};
