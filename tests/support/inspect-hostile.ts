// Run as a process of its own: inspects each file of a folder as an upload, and says what it took.
import { readFileSync } from 'node:fs';
import { images } from '@/adapters/images/sharp';
import type { FilePurpose } from '@/domain/paperwork/file/limits';
import { inspectFile } from '@/services/file/content/inspect-file';
import { PREVIEW_WIDTHS } from '@/services/file/make-previews';

export interface Inspected {
  readonly file: string;
  readonly words: string;
  readonly milliseconds: number;
  /** Most memory that the process had until then, in MB. */
  readonly peak: number;
}

for (const job of process.argv.slice(2)) {
  const [purpose = '', file = ''] = job.split('=', 2);
  const begun = performance.now();
  const bytes = readFileSync(file);
  const facts = await inspectFile(images, purpose as FilePurpose, bytes);
  if (facts.ok && purpose === 'photograph') await images.previews(bytes, PREVIEW_WIDTHS);
  const inspected: Inspected = {
    file,
    words: facts.ok ? 'kept' : facts.failure.detail,
    milliseconds: Math.round(performance.now() - begun),
    peak: Math.round(process.resourceUsage().maxRSS / 1024),
  };
  console.info(JSON.stringify(inspected));
}
