import { existsSync, readFileSync } from 'node:fs';
import { join, relative } from 'node:path';
import { stripVTControlCharacters } from 'node:util';
import { root } from '../set-up/files.mjs';
import { run } from '../set-up/run.mjs';

/** @typedef {import('./tally.mjs').Line} Line */

/**
 * @typedef {object} FileResult
 * @property {string} name
 * @property {'passed' | 'failed'} status
 * @property {string} [message] why the file could not be read
 * @property {{ status: string, fullName?: string, failureMessages?: string[] }[]} assertionResults
 */

/**
 * One line a project: a file that could not be read counts as one failure, and so does a project
 * without a single test, for then nothing was shown.
 *
 * @param {readonly string[]} projects
 * @param {readonly FileResult[]} files
 * @param {boolean} filtered whether only some files were asked for
 * @returns {Omit<Line, 'milliseconds'>[]}
 */
export function linesOf(projects, files, filtered) {
  return projects.map((name) => {
    const own = files.filter((file) => file.name.startsWith(`tests/${name}/`));
    const results = own.flatMap((file) => file.assertionResults.map(({ status }) => status));
    const passed = results.filter((status) => status === 'passed').length;
    const broken = own.filter(isBroken).length;
    const empty = !filtered && results.length === 0 && broken === 0 ? 1 : 0;
    const failed = results.length - passed + broken + empty;
    return failed === 0
      ? { name, passed, failed }
      : { name, passed, failed, failures: own.flatMap(failuresOf) };
  });
}

/**
 * It failed outside its tests: before the first, or after the last.
 *
 * @param {FileResult} file
 */
const isBroken = (file) =>
  file.status === 'failed' && !file.assertionResults.some(({ status }) => status === 'failed');

/**
 * @param {FileResult} file
 * @returns {string[]} a line for each test of the file that did not pass
 */
function failuresOf(file) {
  const tests = file.assertionResults.filter(({ status }) => status !== 'passed');
  const named = tests.map((test) => ({
    name: `${file.name} > ${test.fullName ?? ''}`,
    why: test.failureMessages?.[0] ?? test.status,
  }));
  if (isBroken(file)) named.push({ name: file.name, why: file.message ?? 'outside its tests' });
  return named.map(({ name, why }) => `  ${name}\n${beginning(why)}`);
}

/** @param {string} text */
const beginning = (text) =>
  stripVTControlCharacters(text)
    .trim()
    .split('\n')
    .filter((line) => line.trim() !== '')
    .slice(0, 3)
    .map((line) => `      ${line.trim().slice(0, 200)}`)
    .join('\n');

/**
 * Runs test projects and shows their output.
 *
 * @param {object} options
 * @param {readonly string[]} options.projects
 * @param {readonly string[]} options.filters files to run; none means all
 * @param {NodeJS.ProcessEnv} options.env
 * @param {string} options.folder for the result file
 * @returns {Promise<Line[]>}
 */
export async function runProjects({ projects, filters, env, folder }) {
  const begun = performance.now();
  const file = join(folder, `results-${projects.join('-')}.json`);
  const { code } = await run(
    process.execPath,
    [
      join(root, 'node_modules/vitest/vitest.mjs'),
      'run',
      ...projects.flatMap((name) => ['--project', name]),
      '--passWithNoTests',
      '--reporter=default',
      '--reporter=json',
      `--outputFile.json=${file}`,
      ...filters,
    ],
    { cwd: root, env: { ...env, NODE_ENV: 'test' }, output: 'show' },
  );
  const milliseconds = (performance.now() - begun) / projects.length;
  const read = existsSync(file) ? JSON.parse(readFileSync(file, 'utf8')).testResults : [];
  const files = /** @type {FileResult[]} */ (read).map((result) => ({
    ...result,
    name: relative(root, result.name),
  }));
  const lines = linesOf(projects, files, filters.length > 0).map((line) => ({
    ...line,
    milliseconds,
  }));
  // The runner says no though every test passed: an unhandled error, or it never came to the tests.
  if (code !== 0 && lines.every((line) => line.failed === 0)) {
    lines.push({ name: 'test runner', passed: 0, failed: 1, milliseconds: 0 });
  }
  return lines;
}
