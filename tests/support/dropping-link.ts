import { createServer, type IncomingMessage, request, type ServerResponse } from 'node:http';
import type { AddressInfo, Socket } from 'node:net';

/** A link to the world for one browser, slow, and lost when the test says so. */
export interface DroppingLink {
  /** For the browser's proxy. */
  readonly url: string;
  /** Bytes of bodies that went up by PUT so far. */
  readonly sent: () => number;
  /** Loses the link in the middle of a body, once so many more bytes went up. */
  readonly dropAfter: (bytes: number) => Promise<void>;
  /** The link is there again. */
  readonly restore: () => void;
  readonly stop: () => Promise<void>;
}

/**
 * @param bytesPerSecond how fast bodies go up
 */
export const startDroppingLink = async (bytesPerSecond: number): Promise<DroppingLink> => {
  let sent = 0;
  let down = false;
  let drop: { readonly at: number; readonly dropped: () => void } | undefined;
  const sockets = new Set<Socket>();

  const cut = () => {
    down = true;
    for (const socket of sockets) socket.resetAndDestroy();
  };

  const carry = (incoming: IncomingMessage, response: ServerResponse) => {
    const { method = 'GET', headers, url = '' } = incoming;
    const target = new URL(url);
    const on = request(
      {
        host: target.hostname,
        port: target.port,
        method,
        path: target.pathname + target.search,
        headers,
      },
      (from) => {
        response.writeHead(from.statusCode ?? 502, from.headers);
        from.pipe(response);
      },
    );
    on.on('error', () => response.destroy());
    response.on('close', () => !response.writableFinished && on.destroy());
    if (method !== 'PUT') {
      incoming.pipe(on);
      return;
    }
    incoming.on('data', (chunk: Buffer) => {
      sent += chunk.length;
      on.write(chunk);
      if (drop !== undefined && sent >= drop.at) {
        const { dropped } = drop;
        drop = undefined;
        cut();
        dropped();
        return;
      }
      incoming.pause();
      setTimeout(() => incoming.resume(), (chunk.length / bytesPerSecond) * 1000);
    });
    incoming.on('end', () => on.end());
    incoming.on('error', () => on.destroy());
  };

  const server = createServer(carry);
  server.on('connection', (socket: Socket) => {
    if (down) {
      socket.resetAndDestroy();
      return;
    }
    sockets.add(socket);
    socket.on('error', () => undefined);
    socket.on('close', () => sockets.delete(socket));
  });
  await new Promise<void>((resolve) => server.listen(0, '127.0.0.1', resolve));
  const { port } = server.address() as AddressInfo;
  return {
    url: `http://127.0.0.1:${port}`,
    sent: () => sent,
    dropAfter: (bytes) =>
      new Promise((dropped) => {
        drop = { at: sent + bytes, dropped };
      }),
    restore: () => {
      down = false;
    },
    stop: () =>
      new Promise((resolve) => {
        for (const socket of sockets) socket.destroy();
        server.close(() => resolve());
      }),
  };
};
