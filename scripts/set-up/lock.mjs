import { linkSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { readJson } from './files.mjs';
import { Problem } from './problem.mjs';

/** @typedef {{ pid: number, begun: string, since: string, url: string }} Holder */

/**
 * When a process began, in the system's own count: tells a process from a later one with its number.
 *
 * @param {number} pid
 * @returns {string | undefined} `undefined` when there is no such process
 */
export function beginningOf(pid) {
  try {
    const stat = readFileSync(`/proc/${pid}/stat`, 'utf8');
    return stat.slice(stat.lastIndexOf(')') + 2).split(' ')[19];
  } catch {
    return undefined;
  }
}

/** @param {Holder} holder */
const isAlive = (holder) => beginningOf(holder.pid) === holder.begun;

/**
 * Takes the one lock of a storage folder, for as long as this process lives or until `release`.
 *
 * @param {string} file
 * @param {string} url where this process will serve
 * @returns {{ release: () => void }}
 * @throws {Problem} naming the address, when another living process holds it
 */
export function takeLock(file, url) {
  /** @type {Holder} */
  const own = {
    pid: process.pid,
    begun: beginningOf(process.pid) ?? '',
    since: new Date().toISOString(),
    url,
  };
  const draft = `${file}.${process.pid}`;
  writeFileSync(draft, JSON.stringify(own), { mode: 0o600 });
  try {
    for (let attempt = 0; attempt < 5; attempt += 1) {
      try {
        linkSync(draft, file);
        return { release: () => rmSync(file, { force: true }) };
      } catch (error) {
        if (!(error instanceof Error && 'code' in error && error.code === 'EEXIST')) throw error;
      }
      const holder = /** @type {Holder | undefined} */ (readJson(file));
      if (holder !== undefined && isAlive(holder)) {
        throw new Problem(
          `Tagwire already runs from this folder, at ${holder.url} (process ${holder.pid}, since ${holder.since}).`,
          `Open that address, or stop it first with Ctrl-C in its window or: kill ${holder.pid}`,
        );
      }
      rmSync(file, { force: true });
    }
  } finally {
    rmSync(draft, { force: true });
  }
  throw new Problem(`${file} changes hands all the time.`, 'Wait until the other start is done.');
}
