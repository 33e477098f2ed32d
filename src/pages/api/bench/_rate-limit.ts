/** A client may spend this many requests at once; they come back at this rate a second. */
const BURST = 600;
const A_SECOND = 20;
const MOST_CLIENTS = 10_000;

interface Bucket {
  readonly left: number;
  readonly at: number;
}

/** A token bucket for each client address, in this process's memory: it guards the processor, not the record. */
export class RateLimit {
  readonly #buckets = new Map<string, Bucket>();

  /** Takes one request; the answer is how many seconds to wait, 0 when it may go on. */
  take(client: string, now: Date): number {
    const at = now.getTime() / 1000;
    const bucket = this.#buckets.get(client) ?? { left: BURST, at };
    const left = Math.min(BURST, bucket.left + Math.max(0, at - bucket.at) * A_SECOND);
    // Set anew, so that the map's order is the order of last use and the oldest can go.
    this.#buckets.delete(client);
    this.#buckets.set(client, { left: left < 1 ? left : left - 1, at });
    if (this.#buckets.size > MOST_CLIENTS) this.#forgetOldest();
    return left < 1 ? Math.ceil((1 - left) / A_SECOND) : 0;
  }

  #forgetOldest(): void {
    const [oldest] = this.#buckets.keys();
    if (oldest !== undefined) this.#buckets.delete(oldest);
  }
}
