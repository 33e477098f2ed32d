// Runs the stand-ins that the file named by the first argument asks for, until told to stop.
import { readFileSync } from 'node:fs';

/** @type {import('../product/stand-ins.mjs').LocalServices} */
const plan = JSON.parse(readFileSync(process.argv[2] ?? '', 'utf8'));

/** @type {(() => Promise<{ stop: () => Promise<void> }>)[]} */
const starters = [];
const { objects, mail, identity } = plan;
if (objects !== undefined) {
  starters.push(async () => (await import('./object-store.mjs')).startObjectStore(objects));
}
if (mail !== undefined) {
  starters.push(async () => (await import('./mail.mjs')).startMailCatcher(mail));
}
if (identity !== undefined) {
  starters.push(async () => (await import('./identity.mjs')).startIdentityProvider(identity));
}

const running = await Promise.all(starters.map((start) => start()));

const stop = () => {
  Promise.all(running.map((server) => server.stop())).then(
    () => process.exit(0),
    (error) => {
      console.error(error);
      process.exit(1);
    },
  );
};
process.once('SIGTERM', stop);
process.once('SIGINT', stop);
