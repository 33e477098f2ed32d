import * as z from 'zod';

const url = z.url();
const origin = url.refine((text) => new URL(text).origin === text, 'an origin without a path');

const schema = z.object({
  PUBLIC_URL: origin,
  HOST: z.string().default('127.0.0.1'),
  PORT: z.coerce.number().int().min(1).max(65535),
  DATABASE_URL: url,
  S3_ENDPOINT: url,
  S3_PUBLIC_ENDPOINT: url.optional(),
  S3_REGION: z.string().default('us-east-1'),
  S3_BUCKET: z.string().min(3),
  S3_ACCESS_KEY_ID: z.string().min(1),
  S3_SECRET_ACCESS_KEY: z.string().min(1),
  SMTP_URL: url,
  MAIL_FROM: z.string().min(3),
  MAIL_BOUNCES: z.email().optional(),
  MAIL_BOUNCE_KEY: z.string().min(24).optional(),
  OIDC_ISSUER: url,
  OIDC_CLIENT_ID: z.string().min(1),
  OIDC_CLIENT_SECRET: z.string().min(1),
  LEDGER_NAME: z
    .string()
    .regex(/^[^\s+]+$/)
    .default('tagwire'),
  LEDGER_KEY_FILE: z.string().min(1),
  LEDGER_PREVIOUS_KEY_FILE: z.string().min(1).optional(),
  STORAGE_DIR: z.string().min(1),
  TRUSTED_PROXY: z.enum(['yes', 'no']).default('no'),
  WORKER: z.enum(['in-process', 'off']).default('in-process'),
});

export type Config = ReturnType<typeof readConfig>;

/**
 * Reads the environment once. A missing or malformed variable stops the start and is named.
 * @throws Error listing every variable at fault
 */
export const readConfig = (environment: NodeJS.ProcessEnv = process.env) => {
  const read = schema.safeParse(environment);
  if (!read.success) {
    const faults = read.error.issues.map((issue) => `  ${issue.path.join('.')}: ${issue.message}`);
    throw new Error(`The configuration is not complete (see .env.example):\n${faults.join('\n')}`);
  }
  const e = read.data;
  return {
    publicUrl: e.PUBLIC_URL,
    host: e.HOST,
    port: e.PORT,
    databaseUrl: e.DATABASE_URL,
    objects: {
      endpoint: e.S3_ENDPOINT,
      publicEndpoint: e.S3_PUBLIC_ENDPOINT ?? e.S3_ENDPOINT,
      region: e.S3_REGION,
      bucket: e.S3_BUCKET,
      accessKeyId: e.S3_ACCESS_KEY_ID,
      secretAccessKey: e.S3_SECRET_ACCESS_KEY,
    },
    mail: {
      url: e.SMTP_URL,
      from: e.MAIL_FROM,
      bounces: e.MAIL_BOUNCES,
      bounceKey: e.MAIL_BOUNCE_KEY,
    },
    identity: {
      issuer: e.OIDC_ISSUER,
      clientId: e.OIDC_CLIENT_ID,
      clientSecret: e.OIDC_CLIENT_SECRET,
    },
    ledger: {
      name: e.LEDGER_NAME,
      current: e.LEDGER_KEY_FILE,
      previous: e.LEDGER_PREVIOUS_KEY_FILE,
    },
    storageDir: e.STORAGE_DIR,
    trustedProxy: e.TRUSTED_PROXY === 'yes',
    worker: e.WORKER,
  } as const;
};
