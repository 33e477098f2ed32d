import { readCaseFile } from '@/contracts/case-file/case-file';
import { checkCaseFile } from '@/contracts/case-file/check-case-file';
import { conclude } from '@/domain/ledger/verify/step';
import type { Ask } from './check-notice';
import type { Report } from './report';
import { readKeys, trustedKeys } from './trusted-keys';

/** Checks a case file and works its reports out anew; loaded only when one is dropped. */
export const checkCaseFileText = async (
  text: string,
  pinned: string,
  ask: Ask,
): Promise<Report> => {
  const read = readCaseFile(text);
  if (!read.ok) {
    return { headline: read.failure.detail, outcome: 'failed', steps: [], says: [], keys: [] };
  }
  const file = read.value;
  const published = readKeys(await ask(`/api/ledger/${file.series}/keys`));
  const trusted = trustedKeys(pinned, published?.published ?? []);
  const steps = [...trusted.steps, ...checkCaseFile(file, trusted.keys)];
  const outcome = conclude(steps);
  const words = {
    passed: 'This file is what the series recorded, and its findings follow from its readings.',
    failed: 'Do not rely on this: something does not hold.',
    'not checked': 'Not everything could be checked. What was, holds.',
  } as const;
  return {
    headline: words[outcome],
    outcome,
    steps,
    says: [`Inspection ${file.inspection}, ${file.batches.length} batches of readings.`],
    keys: trusted.keys,
  };
};
