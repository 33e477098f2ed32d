import { spawn } from 'node:child_process';

/**
 * @typedef {object} RunOptions
 * @property {string} [cwd]
 * @property {NodeJS.ProcessEnv} [env]
 * @property {'capture' | 'show'} [output] `show` passes the command's output on; default `capture`
 * @property {boolean} [wholly] lets it come to its end even when this process is asked to stop
 */

/** @typedef {{ code: number, output: string }} RunResult */

/** @type {Set<import('node:child_process').ChildProcess>} */
const interruptible = new Set();

/** Ends the commands that are running now, those excepted that were started as `wholly`. */
export function interruptCommands() {
  for (const child of interruptible) child.kill('SIGTERM');
}

/**
 * Runs a command to its end, without a terminal and without input.
 *
 * @param {string} command
 * @param {readonly string[]} args
 * @param {RunOptions} [options]
 * @returns {Promise<RunResult>} its exit code (128 and more when a signal ended it, 127 when it does
 *   not exist) and what it printed on either stream, in order
 */
export function run(command, args, options = {}) {
  return new Promise((resolve) => {
    const child = spawn(command, [...args], {
      cwd: options.cwd ?? '/',
      env: options.env ?? process.env,
      stdio: ['ignore', 'pipe', 'pipe'],
      // A group of its own: Ctrl-C in a terminal reaches this process alone, which decides.
      detached: true,
    });
    if (options.wholly !== true) interruptible.add(child);
    let output = '';
    /** @param {Buffer} chunk */
    const take = (chunk) => {
      output += chunk.toString('utf8');
      if (options.output === 'show') process.stdout.write(chunk);
    };
    child.stdout.on('data', take);
    child.stderr.on('data', take);
    /** @param {RunResult} result */
    const finish = (result) => {
      interruptible.delete(child);
      resolve(result);
    };
    child.on('error', (error) => finish({ code: 127, output: `${output}${error.message}` }));
    child.on('close', (code) => finish({ code: code ?? 143, output }));
  });
}

/**
 * The last lines of a command's output, for an error message.
 *
 * @param {string} output
 * @param {number} [lines]
 */
export const tail = (output, lines = 12) => output.trimEnd().split('\n').slice(-lines).join('\n');
