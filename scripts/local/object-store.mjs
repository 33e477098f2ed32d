import { mkdirSync } from 'node:fs';
import S3rver from 's3rver';
import { close, escapeHtml, host } from './listen.mjs';

/** The one account that the stand-in knows. */
export const objectStoreKeys = { accessKeyId: 'S3RVER', secretAccessKey: 'S3RVER' };

/** @param {readonly string[]} origins */
const cors = (origins) => `<CORSConfiguration><CORSRule>
${origins.map((origin) => `<AllowedOrigin>${escapeHtml(origin)}</AllowedOrigin>`).join('')}
<AllowedMethod>GET</AllowedMethod><AllowedMethod>HEAD</AllowedMethod><AllowedMethod>PUT</AllowedMethod>
<AllowedHeader>*</AllowedHeader><ExposeHeader>ETag</ExposeHeader><MaxAgeSeconds>600</MaxAgeSeconds>
</CORSRule></CORSConfiguration>`;

/**
 * An object store that speaks the S3 protocol and keeps its objects as files. It checks little: it
 * stands in for the real one on one machine and is nothing to expose.
 *
 * @param {object} options
 * @param {number} options.port 0 for any
 * @param {string} options.folder
 * @param {string} options.bucket made when missing
 * @param {readonly string[]} options.origins whose pages may read and write with signed addresses
 * @returns {Promise<import('./listen.mjs').Running>}
 */
export async function startObjectStore({ port, folder, bucket, origins }) {
  mkdirSync(folder, { recursive: true });
  const store = new S3rver({
    address: host,
    port,
    silent: true,
    directory: folder,
    vhostBuckets: false,
    configureBuckets: [{ name: bucket, configs: [cors(origins)] }],
  });
  const address = await store.run();
  return { url: `http://${host}:${address.port}`, stop: () => close(store.httpServer) };
}
