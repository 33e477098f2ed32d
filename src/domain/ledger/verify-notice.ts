import { sha256, utf8 } from './bytes';
import { parseCanonical } from './canonical';
import { parseVerifierKey, type VerifierKey } from './note/verifier-key';
import { type CheckedLine, checkExtension, checkLine } from './verify/check-line';
import { lineCommitsTo } from './verify/check-opening';
import type { Extension } from './verify/line-proof';
import type { NoticeFile, PdfFile } from './verify/notice-file';
import { answer, failed, notChecked, type Question, type Step } from './verify/step';

export interface NoticeToVerify {
  readonly file: NoticeFile;
  /** The series' verifier keys, got by the reader elsewhere than from the file; may be none. */
  readonly trustedKeys: readonly string[];
  /** SHA-256 of the PDF in hand and the proof of the ledger line that holds it. */
  readonly pdf?: { readonly sha256: Uint8Array; readonly file?: PdfFile };
  /** A newer head, to see that nothing was rewritten since. */
  readonly since?: Extension;
}

const KEY: Question = {
  id: 'key-known',
  checked: 'The key in the file is the key the series publishes.',
  proves: 'The signatures below are the series’ own.',
  doesNotProve: 'That the place you took the key from is genuine.',
};

const DOCUMENT: Question = {
  id: 'document-form',
  checked: 'The notice is complete and written in its one canonical form.',
  proves: 'Everybody who holds this notice holds the same bytes.',
  doesNotProve: 'That what the notice says is right.',
};

const COMMITTED: Question = {
  id: 'document-committed',
  checked: 'The ledger line was made for exactly this notice.',
  proves: 'Not a letter of the notice was changed after the line was written.',
  doesNotProve: 'That the decision in it is right, or still stands.',
};

const PDF: Question = {
  id: 'pdf-committed',
  checked: 'This PDF is, byte for byte, the one the series recorded for this notice.',
  proves: 'The page you see was not edited after it was published.',
  doesNotProve: 'That the page repeats every word of the notice; compare the two.',
};

const NEEDS_LINE = 'The ledger line could not be verified.';

/** All that can be said about a notice from public data, in the order a reader would ask. */
export const verifyNotice = (notice: NoticeToVerify): readonly Step[] => {
  const { file, trustedKeys, pdf, since } = notice;
  const keys: VerifierKey[] = [];
  for (const text of trustedKeys.length > 0 ? trustedKeys : [file.key]) {
    const key = parseVerifierKey(text);
    if (!key.ok) return [failed(KEY, key.failure.detail)];
    keys.push(key.value);
  }
  const document = parseCanonical(file.document);
  const checked = checkLine(file.proof, keys);
  return [
    trustedKeys.length === 0
      ? notChecked(
          KEY,
          `The file brings its own key: ${file.key}. Compare it with the series’ page.`,
        )
      : answer(
          KEY,
          trustedKeys.includes(file.key),
          'They are the same.',
          `The file names another key: ${file.key}. Below, only your own counts.`,
        ),
    document.ok
      ? answer(DOCUMENT, true, `${utf8(file.document).length} bytes.`, '')
      : failed(DOCUMENT, document.failure.faults?.[0]?.detail ?? document.failure.detail),
    committedStep(file, checked),
    ...checked.steps,
    ...(pdf ? pdfSteps(pdf, checked, keys) : []),
    ...(since && checked.checkpoint ? [checkExtension(checked.checkpoint, since, keys)] : []),
  ];
};

const committedStep = (file: NoticeFile, { line }: CheckedLine): Step =>
  line === undefined
    ? notChecked(COMMITTED, NEEDS_LINE)
    : answer(
        COMMITTED,
        lineCommitsTo(line, file.role, file.salt, sha256(utf8(file.document))),
        `Line ${line.index} commits to it.`,
        `Line ${line.index} commits to something else.`,
      );

const pdfSteps = (
  pdf: NonNullable<NoticeToVerify['pdf']>,
  notice: CheckedLine,
  keys: readonly VerifierKey[],
): readonly Step[] => {
  if (pdf.file === undefined) {
    return [notChecked(PDF, 'The line that holds the PDF’s hash was not at hand; ask the series.')];
  }
  const { line, steps } = checkLine(pdf.file.proof, keys);
  const ofThisNotice =
    line?.kind === 'notice-pdf' &&
    notice.line !== undefined &&
    line.series === notice.line.series &&
    line.refs['notice'] === notice.line.index;
  return [
    ...steps.map((step) => ({ ...step, id: `pdf-${step.id}` })),
    answer(
      PDF,
      ofThisNotice && lineCommitsTo(line, 'pdf', pdf.file.salt, pdf.sha256),
      `Line ${line?.index} commits to it.`,
      'The recorded hash is of another file, or of another notice.',
    ),
  ];
};
