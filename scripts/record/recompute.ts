import { readFileSync } from 'node:fs';
import { readCaseFile } from '@/contracts/case-file/case-file';
import { recompute } from '@/contracts/case-file/recompute';
import { verifyDraw } from '@/domain/draw/verify-draw';
import { readArguments, run } from './arguments';

const usage = `usage: npm run recompute -- <case file>
       npm run recompute -- <draw commitment> <draw made>
  Works every assessment, or the draw, out anew and says "same" or names the differences.
  Ends with 0: same; 1: different, or it could not be worked out.`;

const ofCaseFile = (text: string): number => {
  const file = readCaseFile(text);
  if (!file.ok) throw new Error(file.failure.detail);
  const reports = recompute(file.value);
  if (reports.length === 0) throw new Error('There is no signed report in this file.');
  let differing = 0;
  for (const { revision, batches, findings, differences, signedBy, anewBy } of reports) {
    const what = `report ${revision}: ${findings} findings from ${batches} batches`;
    console.info(`${differences.length === 0 ? 'same' : 'DIFFERENT'}  ${what}`);
    if (signedBy !== anewBy)
      console.info(`  signed with arithmetic ${signedBy}, anew with ${anewBy}`);
    for (const { pointer, signed, anew } of differences) {
      console.info(`  ${pointer}: signed ${signed}, anew ${anew}`);
    }
    differing += differences.length;
  }
  return differing === 0 ? 0 : 1;
};

const ofDraw = (commitment: string, made: string): number => {
  const { steps, run: drawn } = verifyDraw({ commitment, made });
  const wrong = steps.filter(({ outcome }) => outcome === 'failed');
  const cars = drawn?.selected.map(({ car }) => car).join(', ') ?? 'nothing';
  console.info(`${wrong.length === 0 ? 'same' : 'DIFFERENT'}  draw: ${cars}`);
  for (const { checked, found } of wrong) console.info(`  ${checked} ${found}`);
  return wrong.length === 0 ? 0 : 1;
};

await run(usage, async () => {
  const { files } = readArguments([]);
  const [first, second] = files.map((file) => readFileSync(file, 'utf8').trimEnd());
  if (first === undefined || files.length > 2) throw new Error('Give one case file.');
  if (second === undefined) return ofCaseFile(first);
  return ofDraw(first, second);
});
