/**
 * What was tested, step by step.
 *
 * @typedef {object} Line
 * @property {string} name
 * @property {number} passed
 * @property {number} failed
 * @property {number} milliseconds
 * @property {string} [detail] the output, where something failed
 * @property {readonly string[]} [failures] the tests that failed, each with how its reason begins
 */

/** Collects the results and says them. */
export class Tally {
  /** @type {Line[]} */
  #lines = [];

  /** @param {Line} line */
  add(line) {
    this.#lines.push(line);
  }

  get passed() {
    return this.#lines.reduce((sum, line) => sum + line.passed, 0);
  }

  get failed() {
    return this.#lines.reduce((sum, line) => sum + line.failed, 0);
  }

  /**
   * @returns {string} the table of all steps, then what failed by name, since the end of a long
   *   output is often all that is kept; the last line is `N passed, N failed` alone
   */
  toString() {
    const rows = this.#lines.map(
      ({ name, passed, failed, milliseconds }) =>
        `  ${failed === 0 ? 'ok    ' : 'FAILED'} ${name.padEnd(12)} ${String(passed).padStart(5)} passed ${String(failed).padStart(4)} failed ${(milliseconds / 1000).toFixed(1).padStart(7)} s`,
    );
    const failures = this.#lines.flatMap((line) => line.failures ?? []);
    const named = failures.length === 0 ? '' : `\n${failures.join('\n')}\n`;
    return `\n${rows.join('\n')}\n${named}\n${this.passed} passed, ${this.failed} failed`;
  }
}
