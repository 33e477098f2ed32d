import { randomInt } from 'node:crypto';
import { createServer } from 'node:net';
import { readJson, writePrivately } from './files.mjs';
import { Problem } from './problem.mjs';

const host = '127.0.0.1';
// Below the range that the system takes for outgoing connections, so that a chosen port stays free.
const lowest = 20000;
const highest = 32000;

/**
 * @param {number} port
 * @returns {Promise<boolean>} whether a server could listen there now
 */
export function isFree(port) {
  return new Promise((resolve) => {
    const probe = createServer();
    probe.once('error', () => resolve(false));
    probe.listen({ port, host, exclusive: true }, () => probe.close(() => resolve(true)));
  });
}

/** @param {ReadonlySet<number>} taken */
async function chooseFree(taken) {
  for (let attempt = 0; attempt < 200; attempt += 1) {
    const port = randomInt(lowest, highest);
    if (!taken.has(port) && (await isFree(port))) return port;
  }
  throw new Problem(
    `No free port was found on ${host}.`,
    'Stop some of the servers on this machine.',
  );
}

/**
 * One port a name, chosen at the first call and kept in a file from then on.
 *
 * @template {string} Name
 * @param {string} file
 * @param {readonly Name[]} names
 * @returns {Promise<Record<Name, number>>}
 */
export async function rememberedPorts(file, names) {
  const stored = /** @type {Partial<Record<string, number>>} */ (readJson(file) ?? {});
  const taken = new Set(Object.values(stored).filter((port) => port !== undefined));
  const ports = { ...stored };
  for (const name of names) {
    if (Number.isInteger(ports[name])) continue;
    const port = await chooseFree(taken);
    taken.add(port);
    ports[name] = port;
  }
  writePrivately(file, `${JSON.stringify(ports, null, 2)}\n`);
  return /** @type {Record<Name, number>} */ (ports);
}

/**
 * Waits a moment for a port that a server just left, then insists.
 *
 * @param {number} port
 * @param {string} what who wants it, for the message
 * @param {string} mend
 */
export async function demandFree(port, what, mend) {
  const until = performance.now() + 3000;
  while (!(await isFree(port))) {
    if (performance.now() > until) {
      throw new Problem(`Port ${port}, wanted for ${what}, is taken by another program.`, mend);
    }
    await new Promise((resolve) => setTimeout(resolve, 100));
  }
}
