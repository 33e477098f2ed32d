import { sha256 } from '@/domain/ledger/bytes';
import { peekCheckpoint } from '@/domain/ledger/checkpoint';
import { parseLine } from '@/domain/ledger/line';
import { type Extension, extensionShape } from '@/domain/ledger/verify/line-proof';
import { type NoticeFile, readPdfFile } from '@/domain/ledger/verify/notice-file';
import { conclude, type Outcome, type Step } from '@/domain/ledger/verify/step';
import { verifyNotice } from '@/domain/ledger/verify-notice';
import { readKeys, trustedKeys } from './trusted-keys';

/** Asks the series' server for a public path; nothing where it does not know an answer. */
export type Ask = (path: string) => Promise<string | undefined>;

export interface Checked {
  readonly outcome: Outcome;
  readonly steps: readonly Step[];
  /** The document's exact text. */
  readonly document: string;
  /** The key that everything above was checked with. */
  readonly keys: readonly string[];
  /** Whether the server asked keeps the ledger that the file names. */
  readonly known: boolean;
}

const numberOf = (document: string): string => {
  try {
    const { number } = JSON.parse(document) as { number?: unknown };
    return typeof number === 'string' ? number : '';
  } catch {
    return '';
  }
};

const readExtension = (text: string | undefined): Extension | undefined => {
  if (text === undefined) return undefined;
  try {
    const read = extensionShape.safeParse(JSON.parse(text));
    return read.success ? read.data : undefined;
  } catch {
    return undefined;
  }
};

/** Checks a notice from its file, from what the series publishes, and from a key brought along. */
export const checkNotice = async (input: {
  readonly file: NoticeFile;
  /** The PDF that the file came in. */
  readonly pdf?: Uint8Array | undefined;
  /** A verifier key that the reader trusts; empty for the one that the series publishes. */
  readonly pinned: string;
  readonly ask: Ask;
}): Promise<Checked> => {
  const { file, pdf, pinned, ask } = input;
  const line = parseLine(file.proof.line);
  const at = `/api/ledger/${line.ok ? line.value.series : 'unreadable'}`;
  const published = line.ok ? readKeys(await ask(`${at}/keys`)) : undefined;
  const trusted = trustedKeys(pinned, published?.published ?? []);
  const number = encodeURIComponent(numberOf(file.document));
  const pdfText = pdf && published ? await ask(`${at}/notices/${number}/pdf`) : undefined;
  const pdfFile = pdfText === undefined ? undefined : readPdfFile(pdfText);
  const head = peekCheckpoint(file.proof.checkpoint);
  const since =
    head.ok && published
      ? readExtension(await ask(`${at}/consistency?from=${head.value.size}`))
      : undefined;
  const steps = [
    ...trusted.steps,
    ...verifyNotice({
      file,
      trustedKeys: trusted.keys,
      ...(pdf && {
        pdf: { sha256: sha256(pdf), ...(pdfFile?.ok ? { file: pdfFile.value } : {}) },
      }),
      ...(since && { since }),
    }),
  ];
  return {
    outcome: conclude(steps),
    steps,
    document: file.document,
    keys: trusted.keys,
    known: published !== undefined,
  };
};
