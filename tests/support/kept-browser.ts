import { readdirSync, readFileSync } from 'node:fs';
import { type BrowserContext, chromium } from 'playwright-core';
import { flags } from './browser';
import { eventually } from './wait';

/** A browser whose profile stays in a folder, as a tablet's does. */
export const launchAt = (
  folder: string,
  viewport: { readonly width: number; readonly height: number },
): Promise<BrowserContext> =>
  chromium.launchPersistentContext(folder, {
    executablePath: process.env['CHROMIUM_PATH'] ?? '/usr/bin/chromium',
    args: [...flags],
    headless: true,
    viewport,
    hasTouch: true,
    reducedMotion: 'reduce',
    timeout: 60_000,
  });

/** The processes of the browser that lives in this folder. */
const processesOf = (folder: string): readonly number[] =>
  readdirSync('/proc')
    .filter((name) => /^\d+$/.test(name))
    .map(Number)
    .filter((pid) => {
      try {
        return readFileSync(`/proc/${pid}/cmdline`, 'utf8').includes(folder);
      } catch {
        return false;
      }
    });

/** Ends every process of that browser at once, as a dead battery would. Gives how many there were. */
export const killBrowser = async (folder: string): Promise<number> => {
  const pids = processesOf(folder);
  for (const pid of pids) {
    try {
      process.kill(pid, 'SIGKILL');
    } catch {
      // It ended with the one before.
    }
  }
  await eventually('the end of the browser', async () =>
    processesOf(folder).length === 0 ? true : undefined,
  );
  return pids.length;
};
