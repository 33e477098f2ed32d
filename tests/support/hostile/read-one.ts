import { readFileSync } from 'node:fs';
import { judgeCells } from '@/domain/paperwork/sheet/judge-cells';
import { readBook } from '@/domain/paperwork/sheet/read-sheet';
import { paperworkForm } from '@/domain/rulebook/form/paperwork-form';
import { TAPPET_RULE_SET } from '@/domain/rulebook/rule-sets/tappet';
import { GENERIC_LAYOUTS } from '@/domain/tappet/layout/generic-layouts';
import { readSheetRows } from '@/services/paperwork/sheet/read-sheet-rows';
import { nothingSpent } from '@/services/paperwork/sheet/spent';

/** What came of reading one file in a process of its own. */
export interface ReadOne {
  /** The words of the refusal, or how many values were read. */
  readonly answer: string;
  readonly refused: boolean;
  readonly spent: ReturnType<typeof nothingSpent>;
  /** Kilobytes: before the file was read, and at the most. */
  readonly before: number;
  readonly peak: number;
  readonly milliseconds: number;
}

/** Kilobytes this process has held at most; the kernel's own count, which starts anew with the program. */
const peakMemory = (): number => {
  const [, kilobytes] = /VmHWM:\s+(\d+)/.exec(readFileSync('/proc/self/status', 'utf8')) ?? [];
  if (kilobytes === undefined) throw new Error('The kernel does not say how much was held.');
  return Number(kilobytes);
};

const [layout] = GENERIC_LAYOUTS;
const form = paperworkForm(TAPPET_RULE_SET).sheets.find((sheet) => sheet.sheet === 'lifters');
const path = process.argv[2];
if (layout === undefined || form === undefined || path === undefined)
  throw new Error('Name the file to read.');

const before = peakMemory();
const begun = performance.now();
const spent = nothingSpent();
const read = await readSheetRows(readFileSync(path), spent);
const answer = read.ok
  ? `${judgeCells(readBook(read.value.grids, { form, layout }, { fileId: 'f', name: 'f' }).cells).length} values`
  : read.failure.detail;
const one: ReadOne = {
  answer,
  refused: !read.ok,
  spent,
  before,
  peak: peakMemory(),
  milliseconds: Math.round(performance.now() - begun),
};
console.log(JSON.stringify(one));
