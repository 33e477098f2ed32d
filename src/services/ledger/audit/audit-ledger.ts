import type { EntityManager } from '@mikro-orm/postgresql';
import { sha256, toHex, utf8 } from '@/domain/ledger/bytes';
import type { Line } from '@/domain/ledger/line';
import type { Ports } from '../../ports';
import { auditCaptures } from './audit-captures';
import { auditKeys, headFaults, readHeads, sizesOf } from './audit-heads';
import { auditContents, auditLines } from './audit-lines';
import { auditObjects } from './audit-objects';
import { auditRows } from './audit-rows';
import { readErasures } from './erasures';
import { type AuditFault, faultIn } from './fault';

export interface Audit {
  readonly lines: number;
  readonly heads: number;
  /** Empty: everything is as it was recorded. */
  readonly faults: readonly AuditFault[];
}

/** Rules documents by their hash, and that none that a line names is gone. */
const auditRules = async (
  em: EntityManager,
  seriesId: string,
  lines: ReadonlyMap<number, Line>,
): Promise<readonly AuditFault[]> => {
  const inRules = faultIn('record.rules');
  const rows = await em.execute<{ hash: string; document: string }[]>(
    "select encode(hash, 'hex') as hash, document from record.rules where series_id = ?",
    [seriesId],
  );
  const faults = rows.flatMap(({ hash, document }) =>
    toHex(sha256(utf8(document))) === hash
      ? []
      : [inRules(hash, 'The document does not give its hash.')],
  );
  const kept = new Set(rows.map(({ hash }) => hash));
  const named = new Set([...lines.values()].flatMap(({ refs }) => refs['rules'] ?? []));
  for (const hash of named)
    if (!kept.has(hash)) faults.push(inRules(hash, 'A line names these rules, and they are gone.'));
  return faults;
};

/**
 * Holds everything kept of a series against its ledger, and the ledger against signed heads: the
 * stored ones, and those that the auditor brings from elsewhere, which nobody here could change.
 */
export const auditLedger = async (
  deps: Pick<Ports, 'db' | 'objects'>,
  asked: {
    readonly seriesId: string;
    /** Signed notes from receipts, notices, feeds. */
    readonly heads: readonly string[];
    /** Verifier keys got elsewhere; the first published one counts where there is none. */
    readonly keys: readonly string[];
  },
): Promise<Audit> => {
  const { db } = deps;
  const { seriesId } = asked;
  const stored = await readHeads(db, seriesId);
  const sizes = sizesOf([...stored.map(({ note }) => note), ...asked.heads]);
  const grown = await auditLines(db, seriesId, sizes);
  const keys = await auditKeys(db, seriesId, asked.keys);
  const heads = [
    ...asked.heads.map((note, at) => ({ note, what: `head ${at + 1} that was brought` })),
    ...stored.map((row) => ({ note: row.note, what: `size ${row.size}`, stored: row })),
  ];
  const kept = new Set(stored.map(({ note }) => note));
  const dropped = asked.heads.flatMap((note, at) =>
    kept.has(note)
      ? []
      : [faultIn('record.checkpoint')(`head ${at + 1} that was brought`, 'It is no longer kept.')],
  );
  const erasures = await readErasures(db, seriesId, grown.lines);
  return {
    lines: grown.size,
    heads: heads.length,
    faults: [
      ...grown.faults,
      ...dropped,
      ...heads.flatMap((head) => headFaults(head, seriesId, keys, grown)),
      ...(await auditContents(db, seriesId, grown.lines, erasures.contents)),
      ...(await auditRows(db, seriesId, grown.lines, erasures)),
      ...(await auditRules(db, seriesId, grown.lines)),
      ...(await auditCaptures(db, seriesId, grown.lines)),
      ...(await auditObjects(deps, seriesId, erasures.files)),
    ],
  };
};
