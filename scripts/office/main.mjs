import { existsSync, readFileSync, rmSync } from 'node:fs';
import { join } from 'node:path';
import { isDeepStrictEqual } from 'node:util';
import { report } from '../product/main.mjs';
import { ensureDependencies } from '../set-up/dependencies.mjs';
import { root } from '../set-up/files.mjs';
import { ensureOffice } from '../set-up/packages.mjs';
import { progressOn } from '../set-up/progress.mjs';
import { newTemporaryFolder } from '../set-up/temporary.mjs';
import { Tally } from '../testing/tally.mjs';
import { runProjects } from '../testing/vitest.mjs';
import { makeSheets } from './make.mjs';

const fixtures = join(root, 'tests/fixtures/office');

/** @param {string} folder */
const expectations = (folder) => {
  const path = join(folder, 'expected.json');
  return existsSync(path) ? JSON.parse(readFileSync(path, 'utf8')) : undefined;
};

/**
 * `npm run test:office`: has LibreOffice make every messy sheet anew in a temporary folder, and reads
 * them as the product does, against what is committed. `-- --keep` writes the fixtures themselves anew.
 *
 * @param {readonly string[]} args
 */
async function main(args) {
  const tally = new Tally();
  const progress = progressOn();
  const keep = args.includes('--keep');
  let folder = '';
  try {
    await ensureDependencies(root, progress);
    const office = await progress.step('LibreOffice Calc present', () =>
      ensureOffice((line) => progress.say(line)),
    );
    folder = await newTemporaryFolder('tagwire-office-');
    const made = keep ? fixtures : join(folder, 'made');
    await progress.step('sheets made by LibreOffice', () => makeSheets(office, made));
    const same = isDeepStrictEqual(expectations(made), expectations(fixtures));
    if (!same) progress.say('The expectations of the generator are not those that are committed.');
    tally.add({ name: 'expected', passed: Number(same), failed: Number(!same), milliseconds: 0 });
    const env = { ...process.env, TZ: 'UTC', TEST_OFFICE: made };
    const lines = await runProjects({
      projects: ['domain'],
      filters: ['tests/domain/paperwork/office.test.ts'],
      env,
      folder,
    });
    for (const line of lines) tally.add({ ...line, name: 'office' });
  } catch (error) {
    report(error);
    tally.add({ name: 'set-up', passed: 0, failed: 1, milliseconds: 0 });
  } finally {
    if (folder !== '') rmSync(folder, { recursive: true, force: true, maxRetries: 5 });
  }
  console.log(tally.toString());
  process.exitCode = tally.failed === 0 && tally.passed > 0 ? 0 : 1;
}

await main(process.argv.slice(2));
