const LONG_MS = 20 * 60 * 60 * 1000;

/**
 * Why a photograph that comes late still counts: its hash went with the swap, so it was taken by then.
 * Instants in milliseconds by the device's clock; nothing while it is no later than a day at the track.
 */
export const waitedWords = (keptAt: number, now: number, device: string): string =>
  now - keptAt < LONG_MS
    ? ''
    : ` It waited on this ${device} since ${new Date(keptAt).toLocaleString()}. It is sent all the same: its fingerprint was recorded with the swap, which shows that it was taken by then. The officials also see when it arrived.`;
