/**
 * @typedef {object} Progress
 * @property {<T>(what: string, work: () => Promise<T>) => Promise<T>} step runs `work`, then prints its line with the time it took
 * @property {(line: string) => void} say prints a line as it is
 */

/** @param {number} milliseconds */
export const seconds = (milliseconds) => `${(milliseconds / 1000).toFixed(1)} s`;

/**
 * One line a finished step; with a terminal no more than that, without one (a log) also a line when
 * a step begins, so that a long one does not look dead.
 *
 * @param {(line: string) => void} [write]
 * @returns {Progress}
 */
export function progressOn(write = (line) => process.stdout.write(`${line}\n`)) {
  return {
    say: write,
    step: async (what, work) => {
      const begun = performance.now();
      const slow = setTimeout(() => write(`  …    ${what}`), 1500);
      try {
        const result = await work();
        write(`  done ${what} (${seconds(performance.now() - begun)})`);
        return result;
      } finally {
        clearTimeout(slow);
      }
    },
  };
}
