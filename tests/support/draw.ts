import { execFileSync } from 'node:child_process';
import { mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';

const page = join(import.meta.dirname, '../../docs/record-format.md');

/**
 * Runs the stand-alone script that docs/record-format.md prints, in a process of its own, on two
 * published documents. Gives what it prints and how it ends.
 */
export const runPrintedScript = (
  commitment: string,
  made: string,
): { readonly says: string; readonly code: number } => {
  const [, script] = /^```js draw\.mjs\n([\s\S]*?)^```$/m.exec(readFileSync(page, 'utf8')) ?? [];
  if (script === undefined) throw new Error('The page prints no script.');
  const folder = mkdtempSync(join(tmpdir(), 'tagwire-draw-'));
  const paths = ['draw.mjs', 'commitment.json', 'made.json'].map((name) => join(folder, name));
  for (const [i, text] of [script, commitment, made].entries()) writeFileSync(paths[i] ?? '', text);
  try {
    return { says: execFileSync(process.execPath, paths, { encoding: 'utf8' }).trim(), code: 0 };
  } catch (error) {
    const { stdout, status } = error as { stdout: string; status: number };
    return { says: stdout.trim(), code: status };
  } finally {
    rmSync(folder, { recursive: true, force: true });
  }
};

/** Runs the verifier that asks the public site for everything, in a process of its own. */
export const verifyPublicDraw = (
  site: string,
  series: string,
  draw: string,
): { readonly says: string; readonly code: number } => {
  const script = join(import.meta.dirname, 'verify-draw.mjs');
  try {
    const says = execFileSync(process.execPath, [script, site, series, draw], {
      encoding: 'utf8',
      stdio: 'pipe',
    });
    return { says: says.trim(), code: 0 };
  } catch (error) {
    const { stdout, stderr, status } = error as { stdout: string; stderr: string; status: number };
    return { says: `${stdout}${stderr}`.trim(), code: status };
  }
};
