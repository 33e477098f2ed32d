/**
 * What was tested, step by step.
 *
 * @typedef {object} Line
 * @property {string} name
 * @property {number} passed
 * @property {number} failed
 * @property {number} milliseconds
 * @property {string} [detail] the output, where something failed
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

  /** @returns {string} the table of all steps; the last line is `N passed, N failed` alone */
  toString() {
    const rows = this.#lines.map(
      ({ name, passed, failed, milliseconds }) =>
        `  ${failed === 0 ? 'ok    ' : 'FAILED'} ${name.padEnd(12)} ${String(passed).padStart(5)} passed ${String(failed).padStart(4)} failed ${(milliseconds / 1000).toFixed(1).padStart(7)} s`,
    );
    return `\n${rows.join('\n')}\n\n${this.passed} passed, ${this.failed} failed`;
  }
}
