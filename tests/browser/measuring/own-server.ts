import { type ChildProcess, spawn } from 'node:child_process';
import { once } from 'node:events';
import { createServer } from 'node:net';
import { join } from 'node:path';
import { root } from '../../../scripts/set-up/files.mjs';
import { readProduct } from '../../support/product';
import { eventually } from '../../support/wait';

const freePort = async (): Promise<number> => {
  const server = createServer().listen(0, '127.0.0.1');
  await once(server, 'listening');
  const address = server.address();
  server.close();
  await once(server, 'close');
  if (address === null || typeof address === 'string') throw new Error('no port was given');
  return address.port;
};

export interface OwnServer {
  readonly url: string;
  readonly start: () => Promise<void>;
  /** SIGKILL: it ends in the middle of whatever it does. */
  readonly kill: () => Promise<void>;
}

/** A further process of the built product over the same database, at a port of its own, to be killed. */
export const ownServer = async (): Promise<OwnServer> => {
  const port = await freePort();
  const url = `http://127.0.0.1:${port}`;
  const { env } = readProduct();
  let child: ChildProcess | undefined;
  return {
    url,
    start: async () => {
      const build = process.env['TEST_BUILD'] ?? join(root, 'dist');
      child = spawn(process.execPath, [join(build, 'server/server.mjs')], {
        cwd: root,
        stdio: 'ignore',
        env: {
          ...process.env,
          ...env,
          NODE_ENV: 'production',
          PUBLIC_URL: url,
          PORT: String(port),
          WORKER: 'off',
        },
      });
      await eventually('a second server', async () => {
        const answer = await fetch(`${url}/healthz`).catch(() => undefined);
        return answer?.ok ? true : undefined;
      });
    },
    kill: async () => {
      if (child === undefined || child.exitCode !== null) return;
      const ended = once(child, 'exit');
      child.kill('SIGKILL');
      await ended;
      child = undefined;
    },
  };
};
