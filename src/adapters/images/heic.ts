import { existsSync } from 'node:fs';
import { Worker } from 'node:worker_threads';

export interface HeicPicture {
  readonly width: number;
  readonly height: number;
  /** Three bytes a pixel, rows without gaps; only where they were asked for. */
  readonly rgb?: Uint8Array;
}

/** What a decoding may take; beyond it, it is ended. */
export interface HeicBounds {
  /** Bytes of the decoder's own memory. */
  readonly memory: number;
  readonly milliseconds: number;
  readonly heapMegabytes: number;
}

/** Enough for a picture of 50 million pixels, decoded and converted. */
export const HEIC_BOUNDS: HeicBounds = {
  memory: 512_000_000,
  milliseconds: 30_000,
  heapMegabytes: 64,
};

// In the sources it lies beside this file, in the build beside the entry.
const findWorker = (): URL => {
  const places = ['./heic-worker.mjs', '../heic-worker.mjs'];
  const found = places
    .map((place) => new URL(place, import.meta.url))
    .find((url) => existsSync(url));
  if (found === undefined) throw new Error('The worker that decodes HEIC is not there.');
  return found;
};

/**
 * Decodes a HEIC picture in a thread of its own with bounded memory and time, turned upright and
 * without any metadata. Nothing where it cannot be decoded, or not within the bounds.
 */
export const decodeHeic = (
  bytes: Uint8Array,
  options: { readonly pixels: number; readonly wantsPixels: boolean },
  { memory, milliseconds, heapMegabytes }: HeicBounds = HEIC_BOUNDS,
): Promise<HeicPicture | undefined> =>
  new Promise((resolve) => {
    const worker = new Worker(findWorker(), {
      workerData: { bytes, memory, ...options },
      resourceLimits: {
        maxOldGenerationSizeMb: heapMegabytes,
        maxYoungGenerationSizeMb: 16,
        stackSizeMb: 4,
      },
      stdout: true,
      stderr: true,
      env: {},
    });
    const end = (picture?: HeicPicture) => {
      clearTimeout(timer);
      resolve(picture);
      void worker.terminate();
    };
    const timer = setTimeout(end, milliseconds);
    worker.once('message', (picture: HeicPicture | null) => end(picture ?? undefined));
    worker.once('error', () => end());
    worker.once('exit', () => end());
  });
