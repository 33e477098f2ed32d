import { sha256, utf8 } from '@/domain/ledger/bytes';
import { parseVerifierKey, type VerifierKey } from '@/domain/ledger/note/verifier-key';
import { type CheckedLine, checkLine } from '@/domain/ledger/verify/check-line';
import { lineCommitsTo } from '@/domain/ledger/verify/check-opening';
import {
  answer,
  failed,
  notChecked,
  passed,
  type Question,
  type Step,
} from '@/domain/ledger/verify/step';
import type { CaseFile } from './case-file';
import { findChainLength, recompute } from './recompute';

const KEY: Question = {
  id: 'key-known',
  checked: 'The key in the file is one that the series publishes.',
  proves: 'The signatures below are the series’ own.',
  doesNotProve: 'That the place you took the key from is genuine.',
};

const LINES: Question = {
  id: 'lines-included',
  checked: 'Every line in the file stands in the series’ ledger, under a signed head.',
  proves: 'These acts were in the ledger when the head was signed and have not been changed since.',
  doesNotProve: 'That the file holds every line on this inspection.',
};

const CONTENTS: Question = {
  id: 'contents-committed',
  checked: 'Every document in the file is the one its line was made for.',
  proves: 'Not a letter of reports, decisions and notices was changed afterwards.',
  doesNotProve: 'That what they say is right.',
};

const CHAIN: Question = {
  id: 'chain-complete',
  checked:
    'The readings in the file are all that each report was signed over, struck ones included.',
  proves: 'No reading was removed, added or altered before or after the signature.',
  doesNotProve: 'That the readings were taken well.',
};

const ANEW: Question = {
  id: 'worked-out-anew',
  checked: 'Every finding follows from the readings by the rules named in the report.',
  proves: 'The arithmetic was worked out again here, from the raw readings, and gives the same.',
  doesNotProve: 'That the rules are good ones, or that a part is safe.',
};

const keyStep = (file: CaseFile, trusted: readonly string[]): Step =>
  trusted.length === 0
    ? notChecked(KEY, `The file brings its own key: ${file.key}. Compare it with the series’ page.`)
    : answer(
        KEY,
        trusted.includes(file.key),
        'It is.',
        `The file names another key: ${file.key}. Below, only your own counts.`,
      );

const linesStep = (file: CaseFile, checked: readonly CheckedLine[]): Step => {
  const wrong = checked.flatMap(({ line, steps }, at) => {
    const fault = steps.find((step) => step.outcome !== 'passed');
    const other = line !== undefined && line.series !== file.series;
    if (fault === undefined && !other) return [];
    return [
      `Line ${line?.index ?? `no. ${at + 1} in the file`}: ${fault?.found ?? 'another series’.'}`,
    ];
  });
  return answer(
    LINES,
    wrong.length === 0 && checked.length > 0,
    `${checked.length} lines.`,
    wrong.join(' ') || 'There is no line in the file.',
  );
};

const contentsStep = (file: CaseFile, checked: readonly CheckedLine[]): Step => {
  const wrong: string[] = [];
  let count = 0;
  for (const [at, { contents }] of file.lines.entries()) {
    const line = checked[at]?.line;
    for (const { role, salt, document } of contents) {
      if (document === null) continue;
      count += 1;
      const holds = line !== undefined && lineCommitsTo(line, role, salt, sha256(utf8(document)));
      if (!holds) wrong.push(`Line ${line?.index ?? '?'} commits to another ${role}.`);
    }
  }
  return answer(CONTENTS, wrong.length === 0, `${count} documents.`, wrong.join(' '));
};

const chainStep = (file: CaseFile, checked: readonly CheckedLine[]): Step => {
  const heads = checked.flatMap(({ line }) => {
    const chain = line?.refs['chain'];
    return line === undefined || chain === undefined ? [] : [{ index: line.index, chain }];
  });
  const lengths = heads.map(({ index, chain }) => ({
    index,
    length: findChainLength(file, chain),
  }));
  const broken = lengths.filter(({ length }) => length === undefined);
  if (broken.length > 0) {
    const which = broken.map(({ index }) => index).join(', ');
    return failed(
      CHAIN,
      `The readings do not lead to the chain that line ${which} was signed over.`,
    );
  }
  if (lengths.length === 0) return notChecked(CHAIN, 'No report is signed yet.');
  return passed(
    CHAIN,
    lengths.map(({ index, length }) => `Line ${index}: ${length} batches.`).join(' '),
  );
};

const anewStep = (file: CaseFile): Step => {
  try {
    const reports = recompute(file);
    if (reports.length === 0) return notChecked(ANEW, 'There is no report in the file.');
    const differing = reports.flatMap(({ revision, differences }) =>
      differences.map(
        (d) => `Report ${revision}, ${d.pointer}: signed ${d.signed}, anew ${d.anew}.`,
      ),
    );
    return answer(
      ANEW,
      differing.length === 0,
      reports.map((r) => `Report ${r.revision}: same, ${r.findings} findings.`).join(' '),
      differing.join(' '),
    );
  } catch (error) {
    return failed(ANEW, error instanceof Error ? error.message : 'It could not be worked out.');
  }
};

/** All that can be said of a case file without asking anybody, given the keys that count. */
export const checkCaseFile = (file: CaseFile, trusted: readonly string[]): readonly Step[] => {
  const keys: VerifierKey[] = [];
  for (const text of trusted.length > 0 ? trusted : [file.key]) {
    const key = parseVerifierKey(text);
    if (!key.ok) return [failed(KEY, key.failure.detail)];
    keys.push(key.value);
  }
  const checked = file.lines.map(({ proof }) => checkLine(proof, keys));
  return [
    keyStep(file, trusted),
    linesStep(file, checked),
    contentsStep(file, checked),
    chainStep(file, checked),
    anewStep(file),
  ];
};
