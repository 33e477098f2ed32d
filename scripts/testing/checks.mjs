import { join } from 'node:path';
import { root } from '../set-up/files.mjs';
import { run, tail } from '../set-up/run.mjs';

/** @typedef {import('./tally.mjs').Line} Line */

/** @param {string} path below node_modules */
const tool = (path) => join(root, 'node_modules', path);

const code = ['src', 'migrations', 'scripts', 'tests', 'astro.config.mjs', 'vitest.config.ts'];

/** The checks that read the sources; each counts as one test. */
export const sourceChecks = {
  pages: [tool('astro/astro.js'), 'check', '--minimumFailingSeverity', 'error'],
  types: [tool('typescript/bin/tsc'), '--noEmit', '-p', '.'],
  lint: [tool('@biomejs/biome/bin/biome'), 'lint', '--error-on-warnings', '.'],
  format: [tool('@biomejs/biome/bin/biome'), 'format', ...code],
};

/** @typedef {keyof typeof sourceChecks} SourceCheck */

/**
 * @param {SourceCheck} name
 * @param {NodeJS.ProcessEnv} env
 * @returns {Promise<Line>}
 */
export async function runCheck(name, env) {
  const begun = performance.now();
  const { code, output } = await run(process.execPath, sourceChecks[name], { cwd: root, env });
  const milliseconds = performance.now() - begun;
  if (code === 0) return { name, passed: 1, failed: 0, milliseconds };
  return { name, passed: 0, failed: 1, milliseconds, detail: tail(output, 60) };
}
