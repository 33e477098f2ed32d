import { createServer } from 'node:http';

export const host = '127.0.0.1';

/**
 * @typedef {{ url: string, stop: () => Promise<void> }} Running
 */

/**
 * @param {number} port 0 for any
 * @param {import('node:http').RequestListener} answer
 * @returns {Promise<Running & { port: number }>}
 */
export function listen(port, answer) {
  const server = createServer(answer);
  return new Promise((resolve, reject) => {
    server.once('error', reject);
    server.listen(port, host, () => {
      const address = server.address();
      const used = address !== null && typeof address === 'object' ? address.port : port;
      resolve({ port: used, url: `http://${host}:${used}`, stop: () => close(server) });
    });
  });
}

/**
 * Closes a server and the connections that keep it open.
 *
 * @param {import('node:http').Server} server
 * @returns {Promise<void>}
 */
export function close(server) {
  return new Promise((resolve) => {
    server.close(() => resolve());
    server.closeAllConnections();
  });
}

/** @param {string} text */
export const escapeHtml = (text) =>
  text.replace(/[&<>"']/g, (character) => `&#${character.codePointAt(0)};`);

/**
 * One complete page of a stand-in, without scripts and without anything from elsewhere.
 *
 * @param {string} title
 * @param {string} body HTML
 */
export const page = (title, body) => `<!doctype html>
<html lang="en"><head><meta charset="utf-8"><meta name="viewport" content="width=device-width">
<title>${escapeHtml(title)}</title><link rel="icon" href="data:,"><link rel="stylesheet" href="/plain.css"></head>
<body><main><h1>${escapeHtml(title)}</h1>${body}</main></body></html>`;

export const css = `body{font:16px/1.5 system-ui,sans-serif;margin:0;background:#f3f1ec;color:#1c1c1a}
main{max-width:46rem;margin:0 auto;padding:1.5rem}
table{border-collapse:collapse;width:100%}td,th{text-align:left;padding:.5rem;border-bottom:1px solid #b9b5aa;vertical-align:top}
button,input{font:inherit;padding:.6rem .8rem;min-height:44px;box-sizing:border-box}
button{background:#fff;border:1px solid #1c1c1a;cursor:pointer;width:100%;text-align:left}
button:focus-visible,input:focus-visible,a:focus-visible{outline:3px solid #1d4f91;outline-offset:2px}
label{display:block;margin:.8rem 0}input{display:block;width:100%;border:1px solid #1c1c1a;background:#fff}
ul{list-style:none;padding:0}li{margin:.4rem 0}pre{white-space:pre-wrap;background:#fff;padding:1rem;border:1px solid #b9b5aa}
small{display:block;color:#4a4842}`;

/**
 * @param {import('node:http').ServerResponse} response
 * @param {number} status
 * @param {string} type
 * @param {string | Buffer} body
 */
export function answer(response, status, type, body) {
  response.writeHead(status, {
    'content-type': type,
    'cache-control': 'no-store',
    'x-content-type-options': 'nosniff',
    'content-security-policy':
      "default-src 'none'; style-src 'self'; img-src data:; frame-ancestors 'none'",
  });
  response.end(body);
}
