import { mkdirSync, rmSync, symlinkSync } from 'node:fs';
import { join } from 'node:path';
import { ensureBuild } from '../product/build.mjs';
import { withoutConfiguration } from '../product/environment.mjs';
import { chooseAddresses, openStorage } from '../product/home.mjs';
import { report, stopSignal } from '../product/main.mjs';
import { ownCluster, startProduct } from '../product/product.mjs';
import { newStack } from '../product/stack.mjs';
import { ensureDependencies } from '../set-up/dependencies.mjs';
import { root } from '../set-up/files.mjs';
import { ensureChromium, ensurePostgres, postgresPrograms } from '../set-up/packages.mjs';
import { progressOn } from '../set-up/progress.mjs';
import { newTemporaryFolder, usableTemporaryFolder } from '../set-up/temporary.mjs';
import { runCheck } from './checks.mjs';
import { Tally } from './tally.mjs';
import { runProjects } from './vitest.mjs';

const checks = /** @type {const} */ (['pages', 'types', 'lint', 'format']);
const plainProjects = ['domain', 'contracts', 'components', 'services', 'api', 'scripts'];
const steps = [...checks, 'build', ...plainProjects, 'browser'];

/**
 * `npm test [-- step… file…]`: everything, or the named steps, over a cluster and stores of its own
 * in a temporary folder. The last line printed is `N passed, N failed`.
 *
 * @param {readonly string[]} args names of steps; what is none is a filter for test files
 */
export async function test(args) {
  const named = args.filter((arg) => steps.includes(arg));
  const filters = args.filter((arg) => !steps.includes(arg));
  /** @param {string} step */
  const wants = (step) => named.length === 0 || named.includes(step);
  const tally = new Tally();
  const stack = newStack();
  const signal = stopSignal();
  const progress = progressOn();
  try {
    process.env['TMPDIR'] = usableTemporaryFolder();
    await ensureDependencies(root, progress);
    const chromium =
      wants('browser') || wants('scripts')
        ? await progress.step('Chromium present', () => ensureChromium())
        : '';
    if (postgresPrograms().length === 0) {
      await progress.step('PostgreSQL installed', () => ensurePostgres());
    }
    signal.throwIfAborted();
    const folder = await newTemporaryFolder('tagwire-test-');
    stack.push(async () => rmSync(folder, { recursive: true, force: true, maxRetries: 5 }));
    await testIn({ folder, chromium, wants, filters, tally, stack, signal, progress });
  } catch (error) {
    report(signal.aborted ? 'The tests were stopped.' : error);
    tally.add({ name: 'set-up', passed: 0, failed: 1, milliseconds: 0 });
  }
  await stack.stopAll().catch((error) => {
    report(error);
    tally.add({ name: 'clean-up', passed: 0, failed: 1, milliseconds: 0 });
  });
  console.log(tally.toString());
  process.exitCode = tally.failed === 0 && tally.passed > 0 ? 0 : 1;
  // What a test left open must not keep the command from ending; the output is written first.
  process.stdout.write('', () => process.exit());
}

/**
 * @param {object} options
 * @param {string} options.folder
 * @param {string} options.chromium
 * @param {(step: string) => boolean} options.wants
 * @param {readonly string[]} options.filters
 * @param {Tally} options.tally
 * @param {import('../product/stack.mjs').Stack} options.stack
 * @param {AbortSignal} options.signal
 * @param {import('../set-up/progress.mjs').Progress} options.progress
 */
async function testIn({ folder, chromium, wants, filters, tally, stack, signal, progress }) {
  const home = join(folder, 'storage');
  // The build finds its packages by walking up from where it lies.
  symlinkSync(join(root, 'node_modules'), join(folder, 'node_modules'));
  mkdirSync(home, { mode: 0o755 });
  await openStorage(home);
  const buildFolder = join(folder, 'build');
  const clean = withoutConfiguration(process.env);
  const env = {
    ...clean,
    CHROMIUM_PATH: chromium,
    ASTRO_TELEMETRY_DISABLED: '1',
    TZ: 'UTC',
    TEST_BUILD: buildFolder,
  };
  const { publicUrl, ports } = await chooseAddresses(home, clean);

  for (const name of checks.filter(wants)) {
    tally.add(await checked(name, env, progress));
    signal.throwIfAborted();
  }

  const needsBuild = ['build', 'services', 'api', 'browser'].some(wants);
  const built =
    needsBuild && (await builds({ buildFolder, publicUrl, env: clean, tally, progress }));
  signal.throwIfAborted();

  const projects = plainProjects.filter(wants);
  if (projects.length > 0) {
    const cluster = await ownCluster({ home, port: ports.database, stack, progress });
    const testEnv = {
      ...env,
      TEST_CLUSTER_URL: cluster.superuserUrl,
      TEST_CLUSTER_OWNER_URL: cluster.ownerUrl,
      TEST_CLUSTER_APP_URL: cluster.appUrl,
    };
    for (const line of await runProjects({ projects, filters, env: testEnv, folder }))
      tally.add(line);
    signal.throwIfAborted();
  }

  if (wants('browser') && !built) {
    tally.add({ name: 'browser', passed: 0, failed: 1, milliseconds: 0 });
  } else if (wants('browser')) {
    await startProduct({ home, env: clean, mode: 'serve', buildFolder, stack, progress, signal });
    const testEnv = { ...env, TEST_PRODUCT: join(home, 'product.json') };
    for (const line of await runProjects({
      projects: ['browser'],
      filters,
      env: testEnv,
      folder,
    })) {
      tally.add(line);
    }
  }
}

/**
 * @param {object} options
 * @param {string} options.buildFolder
 * @param {string} options.publicUrl
 * @param {NodeJS.ProcessEnv} options.env
 * @param {Tally} options.tally
 * @param {import('../set-up/progress.mjs').Progress} options.progress
 * @returns {Promise<boolean>} whether there is a build now; a failure is shown and counted
 */
async function builds({ buildFolder, publicUrl, env, tally, progress }) {
  const begun = performance.now();
  let failed = 0;
  try {
    await ensureBuild({ root, folder: buildFolder, publicUrl, env, progress });
  } catch (error) {
    report(error);
    failed = 1;
  }
  const milliseconds = performance.now() - begun;
  tally.add({ name: 'build', passed: 1 - failed, failed, milliseconds });
  return failed === 0;
}

/**
 * @param {import('./checks.mjs').SourceCheck} name
 * @param {NodeJS.ProcessEnv} env
 * @param {import('../set-up/progress.mjs').Progress} progress
 */
async function checked(name, env, progress) {
  const line = await progress.step(`checked: ${name}`, () => runCheck(name, env));
  if (line.detail !== undefined) progress.say(`\n${name} failed:\n${line.detail}\n`);
  return line;
}
