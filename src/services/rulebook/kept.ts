/** The values used last, up to a number and a weight of them: the one unused longest goes first. */
export class Kept<V> {
  readonly #values = new Map<string, { readonly value: V; readonly weight: number }>();
  #weight = 0;

  constructor(
    private readonly most: number,
    private readonly heaviest = Number.POSITIVE_INFINITY,
  ) {}

  find(key: string): V | undefined {
    const found = this.#values.get(key);
    if (found === undefined) return undefined;
    this.#values.delete(key);
    this.#values.set(key, found);
    return found.value;
  }

  keep(key: string, value: V, weight = 1): V {
    this.drop(key);
    this.#values.set(key, { value, weight });
    this.#weight += weight;
    for (const oldest of this.#values.keys()) {
      if (this.#values.size <= this.most && this.#weight <= this.heaviest) break;
      this.drop(oldest);
    }
    return value;
  }

  drop(key: string): void {
    this.#weight -= this.#values.get(key)?.weight ?? 0;
    this.#values.delete(key);
  }
}
