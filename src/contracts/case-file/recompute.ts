import { plainBore } from '@/domain/inspection/report';
import { findHex, sameBytes, sha256, toHex, utf8 } from '@/domain/ledger/bytes';
import { chainNextHash, chainStart } from '@/domain/ledger/chain';
import { type PlainDocument, toDocument } from '@/domain/rulebook/document';
import { rowsOfBatches } from './batch-rows';
import type { CaseFile } from './case-file';
import { type Difference, differencesOf } from './differences';
import { assessAnew, readReportRecord } from './report-record';

export interface Recomputed {
  /** Of the report, `1`. */
  readonly revision: string;
  /** How many batches the report rests on. */
  readonly batches: number;
  readonly signedBy: string;
  readonly anewBy: string;
  readonly findings: number;
  /** Empty: the same. */
  readonly differences: readonly Difference[];
}

/** The texts that a case file's lines commit to under this role, in the lines' order. */
export const documentsOf = (file: CaseFile, role: string): readonly string[] =>
  file.lines.flatMap(({ contents }) =>
    contents.flatMap((one) => (one.role === role && one.document !== null ? [one.document] : [])),
  );

/** How many batches lead to this head; nothing when none of the chain's heads is it. */
export const findChainLength = (file: CaseFile, head: string): number | undefined => {
  const wanted = findHex(head, 32);
  if (wanted === undefined) return undefined;
  let at = chainStart(file.inspection);
  for (let count = 0; ; count++) {
    if (sameBytes(at, wanted)) return count;
    const batch = file.batches[count];
    if (batch === undefined) return undefined;
    at = chainNextHash(at, sha256(utf8(batch)));
  }
};

/** What a report says that the arithmetic gives, beside who took and judged which reading. */
const derived = (report: Record<string, PlainDocument>): PlainDocument => ({
  findings: report['findings'] ?? null,
  bores: report['bores'] ?? null,
  completeness: report['completeness'] ?? null,
  redo: report['redo'] ?? null,
  readings: ((report['readings'] ?? []) as readonly Record<string, PlainDocument>[]).map(
    ({ row, ...judged }) => {
      // The server's own remarks beside a row go into no result.
      const {
        note: _note,
        batch: _batch,
        temperatures,
        ...taken
      } = row as Record<string, PlainDocument>;
      const logged =
        Object.keys((temperatures ?? {}) as object).length === 0 ? {} : { temperatures };
      return { ...judged, row: { ...taken, ...(logged as Record<string, PlainDocument>) } };
    },
  ),
});

/**
 * Works every signed report out anew from the raw readings in its chain, by the rules it names.
 * Throws, in plain words, where the file lacks what that takes.
 */
export const recompute = (file: CaseFile): readonly Recomputed[] =>
  documentsOf(file, 'report').map((document) => {
    const report = readReportRecord(document);
    const revision = report.revision.number;
    const rules = file.rules.find((text) => toHex(sha256(utf8(text))) === report.rulesHash);
    if (rules === undefined)
      throw new Error(`The rules of report ${revision} are not in the file.`);
    const batches = findChainLength(file, report.chainHead);
    if (batches === undefined)
      throw new Error(`The batches in the file do not lead to the chain of report ${revision}.`);
    const anew = assessAnew(report, rules, rowsOfBatches(file.batches.slice(0, batches)));
    const { findings, completeness, redo, judged: readings, domainVersion } = anew;
    const bores = anew.bores.map(plainBore);
    const made = toDocument({ findings, bores, completeness, redo, readings });
    return {
      revision,
      batches,
      signedBy: report.domainVersion,
      anewBy: domainVersion,
      findings: findings.length,
      differences: differencesOf(
        derived(JSON.parse(document) as Record<string, PlainDocument>),
        derived(made as Record<string, PlainDocument>),
      ),
    };
  });
