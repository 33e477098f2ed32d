/**
 * What holds the running parts; they are stopped in the opposite order.
 *
 * @typedef {object} Stack
 * @property {(stop: () => Promise<void>) => void} push
 * @property {() => Promise<void>} stopAll
 */

/** @returns {Stack} */
export function newStack() {
  /** @type {(() => Promise<void>)[]} */
  const stops = [];
  return {
    push: (stop) => {
      stops.push(stop);
    },
    stopAll: async () => {
      /** @type {unknown} */
      let failure;
      for (let stop = stops.pop(); stop !== undefined; stop = stops.pop()) {
        await stop().catch((error) => {
          failure ??= error;
        });
      }
      if (failure !== undefined) throw failure;
    },
  };
}
