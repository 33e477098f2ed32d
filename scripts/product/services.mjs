import { spawn } from 'node:child_process';
import { createWriteStream, mkdirSync, readFileSync } from 'node:fs';
import { dirname, join } from 'node:path';
import { root } from '../set-up/files.mjs';
import { Problem } from '../set-up/problem.mjs';
import { tail } from '../set-up/run.mjs';

/**
 * A program that runs beside this one and ends with it.
 *
 * @typedef {object} Service
 * @property {string} name
 * @property {number} pid
 * @property {Promise<number>} ended its exit code, 128 and more when a signal ended it
 * @property {() => Promise<void>} stop asks it to end, and after ten seconds makes it
 */

const follow = join(root, 'scripts/product/follow-parent.mjs');

/**
 * Starts a script of this checkout in a process group of its own, so that Ctrl-C reaches this
 * process alone, which then ends everything in order. The script also ends when this process dies.
 *
 * @param {object} options
 * @param {string} options.name
 * @param {readonly string[]} options.args of node
 * @param {NodeJS.ProcessEnv} options.env
 * @param {string} options.log file for its output
 * @returns {Service}
 */
export function startService({ name, args, env, log }) {
  mkdirSync(dirname(log), { recursive: true });
  const sink = createWriteStream(log, { mode: 0o600 });
  const child = spawn(process.execPath, ['--import', follow, ...args], {
    cwd: root,
    env,
    detached: true,
    stdio: ['ignore', 'pipe', 'pipe', 'ipc'],
  });
  child.stdout?.pipe(sink, { end: false });
  child.stderr?.pipe(sink, { end: false });
  /** @type {Promise<number>} */
  const ended = new Promise((resolve) => {
    child.once('error', () => resolve(127));
    child.once('close', (code) => sink.end(() => resolve(code ?? 143)));
  });
  const pid = child.pid ?? 0;
  /** @param {NodeJS.Signals} signal */
  const signalGroup = (signal) => {
    try {
      process.kill(-pid, signal);
    } catch {
      // It is gone already.
    }
  };
  return {
    name,
    pid,
    ended,
    stop: async () => {
      if (pid === 0) return;
      child.kill('SIGTERM');
      const force = setTimeout(() => signalGroup('SIGKILL'), 10_000);
      await ended;
      clearTimeout(force);
      signalGroup('SIGKILL');
    },
  };
}

/**
 * Waits until an address answers with success.
 *
 * @param {object} options
 * @param {Service} options.service whose end is a failure
 * @param {string} options.url
 * @param {string} options.log
 * @param {number} [options.patience] milliseconds
 */
export async function untilAnswering({ service, url, log, patience = 90_000 }) {
  const until = performance.now() + patience;
  /** @type {number | undefined} */
  let code;
  service.ended.then((value) => {
    code = value;
  });
  let last = 'nothing answered';
  while (performance.now() < until) {
    if (code !== undefined) {
      throw new Problem(
        `The ${service.name} ended while starting (exit code ${code}):\n${tail(readFileSync(log, 'utf8'), 25)}`,
        `Its whole output is in ${log}.`,
      );
    }
    try {
      const response = await fetch(url, { signal: AbortSignal.timeout(5000) });
      await response.arrayBuffer();
      if (response.ok) return;
      last = `status ${response.status}`;
    } catch (error) {
      last = error instanceof Error ? error.message : String(error);
    }
    await new Promise((resolve) => setTimeout(resolve, 50));
  }
  throw new Problem(
    `The ${service.name} did not become ready at ${url} (${last}).`,
    `Look into ${log}.`,
  );
}
