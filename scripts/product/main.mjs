import { join, resolve } from 'node:path';
import { ensureDependencies } from '../set-up/dependencies.mjs';
import { root } from '../set-up/files.mjs';
import { takeLock } from '../set-up/lock.mjs';
import { explain } from '../set-up/problem.mjs';
import { progressOn } from '../set-up/progress.mjs';
import { interruptCommands } from '../set-up/run.mjs';
import { usableTemporaryFolder } from '../set-up/temporary.mjs';
import { chooseAddresses, demandSitePort, openStorage } from './home.mjs';
import { startProduct } from './product.mjs';
import { demoPeople } from './seed.mjs';
import { newStack } from './stack.mjs';

/** @param {unknown} error */
export function report(error) {
  const { message, mend, trace } = explain(error);
  console.error(`\n${message}\n→ ${mend}`);
  if (trace !== undefined) console.error(trace);
}

/** @returns {AbortSignal} aborted at the first SIGINT, SIGTERM or SIGHUP, or when npm is gone */
export function stopSignal() {
  const controller = new AbortController();
  /** @param {string} reason */
  const stop = (reason) => {
    if (controller.signal.aborted) return;
    controller.abort(new Error(`stopped by ${reason}`));
    interruptCommands();
  };
  for (const name of /** @type {const} */ (['SIGINT', 'SIGTERM', 'SIGHUP'])) {
    process.on(name, () => stop(name));
  }
  // npm that is killed takes nobody along; whoever it ran is then handed to another parent.
  if (process.env['npm_lifecycle_event'] !== undefined) {
    const npm = process.ppid;
    setInterval(() => process.ppid === npm || stop('the end of npm'), 250).unref();
  }
  // Whoever read the output may be gone; stopping goes on all the same.
  process.stdout.on('error', () => undefined);
  process.stderr.on('error', () => undefined);
  return controller.signal;
}

/** @param {AbortSignal} signal */
const aborted = (signal) =>
  new Promise((resolve) =>
    signal.addEventListener('abort', () => resolve('asked'), { once: true }),
  );

/**
 * `npm start` and, with `--dev`, `npm run dev`.
 *
 * @param {readonly string[]} args
 */
export async function start(args) {
  const begun = performance.now();
  const mode = args.includes('--dev') ? 'dev' : 'serve';
  const home = resolve(process.env['STORAGE_DIR'] || join(root, 'storage'));
  const progress = progressOn();
  const signal = stopSignal();
  const stack = newStack();
  /** @type {{ release: () => void } | undefined} */
  let lock;
  let code = 0;
  try {
    process.env['TMPDIR'] = usableTemporaryFolder();
    await openStorage(home);
    const { publicUrl, port } = await chooseAddresses(home, process.env);
    lock = takeLock(join(home, 'running.json'), publicUrl);
    await demandSitePort({ home, port, env: process.env });
    await ensureDependencies(root, progress);
    signal.throwIfAborted();
    const { server, mailboxUrl, cluster } = await startProduct({
      home,
      env: process.env,
      mode,
      buildFolder: join(root, 'dist'),
      stack,
      progress,
      signal,
    });
    if (mailboxUrl !== undefined)
      progress.say(`  note Mail is kept, not sent; read it at ${mailboxUrl}`);
    const took = ((performance.now() - begun) / 1000).toFixed(1);
    progress.say(`\nTagwire is ready after ${took} s:  ${publicUrl}\n`);
    if (cluster !== undefined) progress.say(listing(demoPeople(home)));
    progress.say('Ctrl-C stops all of it.');
    const end = await Promise.race([server.ended, aborted(signal)]);
    if (end !== 'asked') {
      code = 1;
      console.error(
        `\nThe server ended by itself (exit code ${end}); its log is ${join(home, 'logs/server.log')}.`,
      );
    }
  } catch (error) {
    code = signal.aborted ? 0 : 1;
    if (!signal.aborted) report(error);
  }
  try {
    await stack.stopAll();
    if (signal.aborted) progress.say('Stopped.');
  } catch (error) {
    report(error);
    code = 1;
  }
  lock?.release();
  process.exit(code);
}

/** @param {readonly import('../local/identity.mjs').Person[]} people */
function listing(people) {
  if (people.length === 0) return '';
  const width = Math.max(...people.map((person) => person.name.length));
  const lines = people.map((person) => `  ${person.name.padEnd(width)}  ${person.part}`);
  return `Sign in as (no password is asked on this machine):\n${lines.join('\n')}\n`;
}
