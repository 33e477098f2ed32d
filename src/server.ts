import { createServer, type IncomingMessage, type ServerResponse } from 'node:http';
import { fileURLToPath } from 'node:url';
import compression from 'compression';
import sirv from 'sirv';
import { composition } from '@/composition';
import { limitBody } from '@/http/node/limit-body';
import { passOneClick } from '@/http/node/one-click';
import { secureHeaders } from '@/http/node/secure-headers';

type Handler = (request: IncomingMessage, response: ServerResponse, next?: () => void) => void;

const app = await composition();
const { config } = app;

// The pages' handler is the build's other entry; it lies beside this file and is not bundled into it.
const entry = new URL('./entry.mjs', import.meta.url).href;
const { handler: pages } = (await import(/* @vite-ignore */ entry)) as { handler: Handler };

const assets = sirv(fileURLToPath(new URL('../client/', import.meta.url)), {
  etag: true,
  setHeaders: (response, path) => {
    if (path.startsWith('/_astro/')) {
      response.setHeader('cache-control', 'public, max-age=31536000, immutable');
    }
  },
});
const compress = compression() as unknown as Handler;

const server = createServer((request, response) => {
  secureHeaders(response);
  if (!config.trustedProxy) {
    delete request.headers['x-forwarded-for'];
    delete request.headers['x-forwarded-host'];
    delete request.headers['x-forwarded-proto'];
    delete request.headers['x-forwarded-port'];
  }
  passOneClick(request);
  const path = request.url?.split('?', 1)[0] ?? '/';
  if (path === '/healthz') {
    void app.ready().then(
      (ready) => response.writeHead(ready ? 200 : 503).end(ready ? 'ok' : 'not ready'),
      () => response.writeHead(503).end('not ready'),
    );
    return;
  }
  if (path.startsWith('/_image')) {
    response.writeHead(404).end();
    return;
  }
  if (!limitBody(request, response)) return;
  compress(request, response, () => assets(request, response, () => pages(request, response)));
});

server.requestTimeout = 30_000;
server.headersTimeout = 10_000;
server.keepAliveTimeout = 5_000;
server.maxRequestsPerSocket = 0;

if (config.worker === 'in-process') await app.startWorker();
server.listen(config.port, config.host, () => {
  console.info(`Tagwire listens on ${config.publicUrl}`);
});

let stopping = false;
const stop = () => {
  if (stopping) return;
  stopping = true;
  server.close(() => {
    void app.close().then(
      () => process.exit(0),
      () => process.exit(1),
    );
  });
  server.closeIdleConnections();
  void app.endStreams();
  setTimeout(() => server.closeAllConnections(), 8_000).unref();
};
process.on('SIGTERM', stop);
process.on('SIGINT', stop);
