import { type ChildProcess, spawn } from 'node:child_process';
import { writeFileSync } from 'node:fs';
import { rm } from 'node:fs/promises';
import { join } from 'node:path';
import { startIdentityProvider } from '../../scripts/local/identity.mjs';
import { startMailCatcher } from '../../scripts/local/mail.mjs';
import { objectStoreKeys, startObjectStore } from '../../scripts/local/object-store.mjs';
import { buildIn } from '../../scripts/product/build.mjs';
import { ensureLedgerKey, withoutConfiguration } from '../../scripts/product/environment.mjs';
import { root } from '../../scripts/set-up/files.mjs';
import { takeLock } from '../../scripts/set-up/lock.mjs';
import { rememberedPorts } from '../../scripts/set-up/ports.mjs';
import { Problem } from '../../scripts/set-up/problem.mjs';
import { newTemporaryFolder } from '../../scripts/set-up/temporary.mjs';
import type { TestDatabase } from './database';
import type { DemoPerson } from './product';
import { eventually } from './wait';

export interface TestServices {
  /** Everything the product is configured with but its database. */
  readonly env: Readonly<Record<string, string>>;
  readonly publicUrl: string;
  readonly port: number;
  readonly mailboxUrl: string;
  readonly folder: string;
  readonly stop: () => Promise<void>;
}

const bucket = 'tagwire';
const buildFolder = process.env['TEST_BUILD'] ?? join(root, 'dist');

/** Object store, mail catcher and identity provider of the test file's own, in a temporary folder. */
export async function startServices(people: readonly DemoPerson[] = []): Promise<TestServices> {
  const folder = await newTemporaryFolder('tagwire-services-');
  const ports = await rememberedPorts(join(folder, 'ports.json'), ['site', 'identity']);
  const publicUrl = buildIn(buildFolder)?.publicUrl ?? `http://127.0.0.1:${ports.site}`;
  const port = Number(new URL(publicUrl).port);
  const peopleFile = join(folder, 'people.json');
  writeFileSync(peopleFile, JSON.stringify({ people }));
  const objects = await startObjectStore({
    port: 0,
    folder: join(folder, 'objects'),
    bucket,
    origins: [publicUrl],
  });
  const mail = await startMailCatcher({ smtpPort: 0, pagePort: 0, folder: join(folder, 'mail') });
  const identity = await startIdentityProvider({
    port: ports.identity,
    folder: join(folder, 'identity'),
    peopleFile,
    clientId: 'tagwire-test',
    clientSecret: 'test',
    redirectUris: [`${publicUrl}/sign-in/return`],
  });
  return {
    publicUrl,
    port,
    mailboxUrl: mail.url,
    folder,
    env: {
      PUBLIC_URL: publicUrl,
      HOST: '127.0.0.1',
      PORT: String(port),
      S3_ENDPOINT: objects.url,
      S3_PUBLIC_ENDPOINT: objects.url,
      S3_REGION: 'us-east-1',
      S3_BUCKET: bucket,
      S3_ACCESS_KEY_ID: objectStoreKeys.accessKeyId,
      S3_SECRET_ACCESS_KEY: objectStoreKeys.secretAccessKey,
      SMTP_URL: mail.smtpUrl,
      MAIL_FROM: 'Tagwire <tagwire@localhost>',
      OIDC_ISSUER: identity.url,
      OIDC_CLIENT_ID: 'tagwire-test',
      OIDC_CLIENT_SECRET: 'test',
      LEDGER_KEY_FILE: ensureLedgerKey(folder),
      STORAGE_DIR: folder,
    },
    stop: async () => {
      await Promise.all([objects.stop(), mail.stop(), identity.stop()]);
      await rm(folder, { recursive: true, force: true, maxRetries: 5 });
    },
  };
}

export interface TestServer {
  readonly url: string;
  /** Ends it at once, as a power cut would. */
  readonly kill: () => Promise<void>;
  /** Asks it to end, and waits until it has. */
  readonly stop: () => Promise<void>;
  /** What it has printed so far. */
  readonly output: () => string;
}

const ended = (child: ChildProcess): Promise<void> =>
  child.exitCode !== null || child.signalCode !== null
    ? Promise.resolve()
    : new Promise((resolve) => child.once('close', () => resolve()));

/**
 * Waits until no other test serves the build, which holds one public address, and keeps it.
 *
 * @param url where it will be served
 */
export const takeTurn = (url: string): Promise<{ readonly release: () => void }> =>
  eventually(
    'the turn to serve the one build',
    async () => {
      try {
        return takeLock(join(buildFolder, '.serving.json'), url);
      } catch (error) {
        if (error instanceof Problem) return undefined;
        throw error;
      }
    },
    300_000,
  );

/** The build under test. @throws Error when there is none */
export function testBuild(): { readonly folder: string; readonly publicUrl: string } {
  const build = buildIn(buildFolder);
  if (build === undefined) {
    throw new Error('This test needs the built product: run it with `npm test -- api <file>`.');
  }
  return { folder: buildFolder, publicUrl: build.publicUrl };
}

/**
 * The built product's server over a test database. `npm test` builds it; by hand it takes the build
 * of the last `npm start`. A build holds one public address, so a second server waits for its turn.
 */
export async function startServer(options: {
  readonly database: TestDatabase;
  readonly services: TestServices;
  readonly env?: Readonly<Record<string, string>>;
}): Promise<TestServer> {
  const entry = join(testBuild().folder, 'server/server.mjs');
  const url = options.services.publicUrl;
  const turn = await takeTurn(url);
  const child = spawn(process.execPath, [entry], {
    cwd: root,
    stdio: ['ignore', 'pipe', 'pipe'],
    env: {
      ...withoutConfiguration(process.env),
      ...options.services.env,
      DATABASE_URL: options.database.appUrl,
      NODE_ENV: 'production',
      ...options.env,
    },
  });
  let output = '';
  const take = (chunk: Buffer) => {
    output += chunk.toString('utf8');
  };
  child.stdout.on('data', take);
  child.stderr.on('data', take);
  const end = async (signal: NodeJS.Signals) => {
    child.kill(signal);
    await ended(child);
    turn.release();
  };
  try {
    await eventually('the server to answer', async () => {
      if (child.exitCode !== null) throw new Error(`The server ended while starting:\n${output}`);
      const response = await fetch(`${url}/healthz`).catch(() => undefined);
      return response?.ok === true ? true : undefined;
    });
  } catch (error) {
    await end('SIGKILL');
    throw error;
  }
  return { url, kill: () => end('SIGKILL'), stop: () => end('SIGTERM'), output: () => output };
}
