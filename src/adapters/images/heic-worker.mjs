// A thread of its own: decodes one HEIC picture and ends. What goes wrong in here stays in here.
import { createRequire } from 'node:module';
import { parentPort, workerData } from 'node:worker_threads';

/** @typedef {{ bytes: Uint8Array, memory: number, pixels: number, wantsPixels: boolean }} HeicJob */
/** @typedef {{ id: unknown, data: Uint8Array, width: number, height: number, stride: number }} Channel */

const PAGE = 65_536;
const { bytes, memory, pixels, wantsPixels } = /** @type {HeicJob} */ (workerData);

// Limits of the thread do not hold for the decoder's own memory: it may grow to the bound and no further.
const grow = WebAssembly.Memory.prototype.grow;
WebAssembly.Memory.prototype.grow = function (pages) {
  if (this.buffer.byteLength + Number(pages) * PAGE > memory)
    throw new RangeError('too much memory');
  return grow.call(this, pages);
};
// The decoder writes its complaints there.
console.log = () => undefined;

const heif = createRequire(import.meta.url)('libheif-js/wasm-bundle');

/** @param {unknown} handle */
async function decode(handle) {
  const made = await heif.heif_js_decode_image2(
    handle,
    heif.heif_colorspace.heif_colorspace_RGB,
    heif.heif_chroma.heif_chroma_interleaved_RGB,
  );
  /** @type {Channel | undefined} */
  const plane = made?.channels?.find(
    (/** @type {Channel} */ { id }) => id === heif.heif_channel.heif_channel_interleaved,
  );
  if (plane === undefined) return undefined;
  const { width, height, stride, data } = plane;
  if (!wantsPixels) return { width, height };
  const rgb = new Uint8Array(width * height * 3);
  for (let row = 0; row < height; row += 1) {
    rgb.set(data.subarray(row * stride, row * stride + width * 3), row * width * 3);
  }
  return { width, height, rgb };
}

const images = new heif.HeifDecoder().decode(bytes);
const picture =
  images.find((/** @type {{ is_primary(): boolean }} */ one) => one.is_primary()) ?? images[0];
const fits = picture !== undefined && picture.get_width() * picture.get_height() <= pixels;
const decoded = fits ? await decode(picture.handle) : undefined;
parentPort?.postMessage(decoded ?? null, decoded?.rgb === undefined ? [] : [decoded.rgb.buffer]);
