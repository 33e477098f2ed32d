import { join } from 'node:path';
import { newSecret, readJson, root, writePrivately } from '../set-up/files.mjs';
import { demandFree } from '../set-up/ports.mjs';
import { startService, untilAnswering } from './services.mjs';

const host = '127.0.0.1';
const bucket = 'tagwire';
const clientId = 'tagwire-local';

/**
 * What the process of the stand-ins is told to run.
 *
 * @typedef {object} LocalServices
 * @property {string} clientSecret
 * @property {{ port: number, folder: string, bucket: string, origins: string[] }} [objects]
 * @property {{ smtpPort: number, pagePort: number, folder: string }} [mail]
 * @property {{ port: number, folder: string, peopleFile: string, clientId: string, clientSecret: string, redirectUris: string[] }} [identity]
 */

/** @typedef {Record<'objects' | 'smtp' | 'mailbox' | 'identity', number>} Ports */

/**
 * @param {object} options
 * @param {string} options.home
 * @param {string} options.publicUrl
 * @param {Ports} options.ports
 * @param {ReturnType<typeof import('./environment.mjs').wantedStandIns>} options.wanted
 * @param {string} options.clientSecret
 * @returns {LocalServices}
 */
function planned({ home, publicUrl, ports, wanted, clientSecret }) {
  return {
    clientSecret,
    ...(wanted.objects
      ? {
          objects: {
            port: ports.objects,
            folder: join(home, 'objects'),
            bucket,
            origins: [publicUrl],
          },
        }
      : {}),
    ...(wanted.mail
      ? { mail: { smtpPort: ports.smtp, pagePort: ports.mailbox, folder: join(home, 'mail') } }
      : {}),
    ...(wanted.identity
      ? {
          identity: {
            port: ports.identity,
            folder: join(home, 'identity'),
            peopleFile: join(home, 'people.json'),
            clientId,
            clientSecret,
            redirectUris: [`${publicUrl}/sign-in/return`],
          },
        }
      : {}),
  };
}

/**
 * Starts the wanted stand-ins in one process of their own.
 *
 * @param {object} options
 * @param {string} options.home
 * @param {string} options.publicUrl
 * @param {Ports} options.ports
 * @param {ReturnType<typeof import('./environment.mjs').wantedStandIns>} options.wanted
 * @param {NodeJS.ProcessEnv} options.env
 * @returns {Promise<{ service: import('./services.mjs').Service | undefined, env: Record<string, string>, mailboxUrl: string | undefined }>}
 *   `env`: what the product needs to know of them
 */
export async function startStandIns(options) {
  const file = join(options.home, 'local-services.json');
  const known = /** @type {LocalServices | undefined} */ (readJson(file));
  const plan = planned({ ...options, clientSecret: known?.clientSecret ?? newSecret() });
  writePrivately(file, `${JSON.stringify(plan, null, 2)}\n`);

  /** @type {string[]} */
  const probes = [];
  /** @type {Record<string, string>} */
  const env = {};
  /** @type {[string, number][]} */
  const taken = [];
  if (plan.objects !== undefined) {
    const url = `http://${host}:${plan.objects.port}`;
    probes.push(url);
    taken.push(['the local object store', plan.objects.port]);
    const { objectStoreKeys } = await import('../local/object-store.mjs');
    Object.assign(env, {
      S3_ENDPOINT: url,
      S3_PUBLIC_ENDPOINT: url,
      S3_REGION: 'us-east-1',
      S3_BUCKET: bucket,
      S3_ACCESS_KEY_ID: objectStoreKeys.accessKeyId,
      S3_SECRET_ACCESS_KEY: objectStoreKeys.secretAccessKey,
    });
  }
  if (plan.mail !== undefined) {
    probes.push(`http://${host}:${plan.mail.pagePort}/messages.json`);
    taken.push(
      ['the local mail server', plan.mail.smtpPort],
      ['the local mailbox', plan.mail.pagePort],
    );
    env['SMTP_URL'] = `smtp://${host}:${plan.mail.smtpPort}`;
  }
  if (plan.identity !== undefined) {
    const issuer = `http://${host}:${plan.identity.port}`;
    probes.push(`${issuer}/.well-known/openid-configuration`);
    taken.push(['the local identity provider', plan.identity.port]);
    Object.assign(env, {
      OIDC_ISSUER: issuer,
      OIDC_CLIENT_ID: clientId,
      OIDC_CLIENT_SECRET: plan.clientSecret,
    });
  }
  const mailboxUrl = plan.mail === undefined ? undefined : `http://${host}:${plan.mail.pagePort}`;
  if (probes.length === 0) return { service: undefined, env, mailboxUrl };

  for (const [what, port] of taken) {
    await demandFree(
      port,
      what,
      `Stop that program, or remove ${join(options.home, 'ports.json')} to choose other ports.`,
    );
  }
  const log = join(options.home, 'logs/local-services.log');
  const service = startService({
    name: 'local stand-ins',
    args: [join(root, 'scripts/local/serve.mjs'), file],
    env: { ...options.env, NODE_ENV: 'development' },
    log,
  });
  try {
    await Promise.all(probes.map((url) => untilAnswering({ service, url, log })));
  } catch (error) {
    await service.stop();
    throw error;
  }
  return { service, env, mailboxUrl };
}
