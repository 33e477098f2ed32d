import type { SendDeps } from './send-upload';

const ANSWER_MS = 60_000;
/** A connection over which nothing moves for so long is taken for lost. */
const STALLED_MS = 45_000;

export const postJson: SendDeps['post'] = async (path, body) => {
  try {
    const response = await fetch(path, {
      method: 'POST',
      headers: { 'content-type': 'application/json' },
      body: JSON.stringify(body),
      signal: AbortSignal.timeout(ANSWER_MS),
    });
    return { status: response.status, body: await response.json() };
  } catch {
    return undefined;
  }
};

/** Straight to the object store. `fetch` does not say how much has gone. */
export const putBytes: SendDeps['put'] = (url, bytes, { type, signal, onSent }) =>
  new Promise((resolve) => {
    const request = new XMLHttpRequest();
    let timer = 0;
    const moved = () => {
      clearTimeout(timer);
      timer = window.setTimeout(() => request.abort(), STALLED_MS);
    };
    const end = (answer?: { status: number; tag: string }) => {
      clearTimeout(timer);
      signal.removeEventListener('abort', stop);
      resolve(answer);
    };
    const stop = () => request.abort();
    request.open('PUT', url);
    if (type !== undefined) request.setRequestHeader('content-type', type);
    request.upload.onprogress = ({ loaded }) => {
      moved();
      onSent(loaded);
    };
    request.onload = () =>
      end({ status: request.status, tag: request.getResponseHeader('etag') ?? '' });
    request.onerror = () => end();
    request.onabort = () => end();
    signal.addEventListener('abort', stop);
    moved();
    // Without a type of its own, the part carries none.
    request.send(type === undefined ? bytes.slice(0, bytes.size, '') : bytes);
  });
