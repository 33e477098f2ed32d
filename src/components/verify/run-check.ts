import { readNoticeFile } from '@/domain/ledger/verify/notice-file';
import type { Outcome } from '@/domain/ledger/verify/step';
import type { NoticeDocument } from '@/domain/verdict/notice/notice';
import { decisionWords } from '@/domain/verdict/notice/notice-words';
import { type Ask, checkNotice } from './check-notice';
import { readFile } from './read-file';
import type { Report } from './report';

const HEADLINES: Readonly<Record<Outcome, string>> = {
  passed: 'This is what the series recorded, unchanged.',
  failed: 'Do not rely on this: something does not hold.',
  'not checked': 'Not everything could be checked. What was, holds.',
};

const STRANGE =
  'The series that this names is not kept here, so nobody here can vouch for its key.';

const saysOf = (document: string): readonly string[] => {
  try {
    const notice = JSON.parse(document) as NoticeDocument;
    return [`Notice ${notice.number}, ${notice.series.name}.`, decisionWords(notice)];
  } catch {
    return [];
  }
};

/** The server's own public answers; nothing where it has none. */
export const askServer =
  (origin: string): Ask =>
  async (path) => {
    const response = await fetch(`${origin}${path}`);
    return response.ok ? await response.text() : undefined;
  };

const nothing = (headline: string): Report => ({
  headline,
  outcome: 'failed',
  steps: [],
  says: [],
  keys: [],
});

/** Checks a file, whatever it is: a PDF, the file in it, or a case file. */
export const checkBytes = async (bytes: Uint8Array, pinned: string, ask: Ask): Promise<Report> => {
  const read = await readFile(bytes);
  if (read.kind === 'unreadable') return nothing(read.why);
  if (read.kind === 'case-file') {
    const { checkCaseFileText } = await import('./check-case');
    return checkCaseFileText(read.text, pinned, ask);
  }
  const { file, pdf } = read;
  const checked = await checkNotice({ file, ...(pdf && { pdf }), pinned, ask });
  const strange = !checked.known && checked.outcome !== 'failed';
  return {
    headline: strange ? STRANGE : HEADLINES[checked.outcome],
    outcome: checked.outcome,
    steps: checked.steps,
    says: saysOf(checked.document),
    keys: checked.keys,
  };
};

/** Checks a published notice by its series and number. */
export const checkNumber = async (
  series: string,
  number: string,
  pinned: string,
  ask: Ask,
): Promise<Report> => {
  const at = `/api/ledger/${encodeURIComponent(series)}/notices/${encodeURIComponent(number)}`;
  const text = await ask(at);
  if (text === undefined) return nothing(`There is no notice ${number} in this series.`);
  const file = readNoticeFile(text);
  if (!file.ok) return nothing(file.failure.detail);
  const checked = await checkNotice({ file: file.value, pinned, ask });
  return {
    headline: HEADLINES[checked.outcome],
    outcome: checked.outcome,
    steps: checked.steps,
    says: saysOf(checked.document),
    keys: checked.keys,
  };
};
