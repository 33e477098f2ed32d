import type { IncomingMessage, ServerResponse } from 'node:http';

/** Photographs and sheets go to the object store; what comes here is JSON and forms. */
export const MOST_BODY_BYTES = 1_048_576;

const refuse = (response: ServerResponse): void => {
  response.writeHead(413, { 'content-type': 'application/problem+json', connection: 'close' }).end(
    JSON.stringify({
      type: '/problems/too-large',
      title: 'Too large',
      status: 413,
      detail: `A request may hold ${MOST_BODY_BYTES} bytes. Files are uploaded, not sent here.`,
    }),
  );
};

/**
 * Refuses a body beyond the limit: at once where its length is announced, else as soon as it has
 * grown too long. Returns whether the request may go on.
 */
export const limitBody = (request: IncomingMessage, response: ServerResponse): boolean => {
  const announced = Number(request.headers['content-length'] ?? 0);
  if (announced > MOST_BODY_BYTES) {
    refuse(response);
    request.resume();
    return false;
  }
  if (request.headers['transfer-encoding'] !== undefined) {
    let seen = 0;
    request.on('data', (part: Buffer) => {
      seen += part.length;
      if (seen > MOST_BODY_BYTES) {
        if (!response.headersSent) refuse(response);
        request.destroy();
      }
    });
    request.pause();
  }
  return true;
};
