import type { EntityManager } from '@mikro-orm/postgresql';
import { toHex, utf8 } from '@/domain/ledger/bytes';
import { commit, commitHash, SALT_LENGTH } from '@/domain/ledger/commitment';
import { lineText } from '@/domain/ledger/line';
import type { LineKind } from '@/domain/ledger/line-kind';
import type { Random } from '../ports';

/** Tables of the record; each has an append function of the same name and takes rows in its columns' names. */
export type AppendTable =
  | 'rule_publication'
  | 'bulletin_engine'
  | 'bulletin_acknowledgement'
  | 'paperwork_version'
  | 'paperwork_decision'
  | 'capture_batch'
  | 'zero'
  | 'reading'
  | 'remark'
  | 'report'
  | 'signature_strokes'
  | 'verdict'
  | 'notice_pdf'
  | 'draw'
  | 'draw_end'
  | 'draw_secret'
  | 'erasure'
  | 'engine_transfer'
  | 'engine_swap'
  | 'engine_correction'
  | 'guardian_signature'
  | 'paperwork_withdrawal'
  | 'entry_change'
  | 'result_statement'
  | 'event_check'
  | 'event_clearance'
  | 'served_otherwise'
  | 'gauge_entry'
  | 'gauge_check'
  | 'gauge_fault'
  | 'review_act'
  | 'held_part'
  | 'custody_act'
  | 'seal_act';

/** A document's exact text, or the SHA-256 of something kept elsewhere, a PDF. */
export type LineContent = { readonly open: boolean } & (
  | { readonly text: string }
  | { readonly sha256: Uint8Array }
);

export interface NewLedgerLine {
  readonly seriesId: string;
  readonly kind: LineKind;
  /**
   * What the line commits to, by role. `open` content may be shown to everybody beside its salt;
   * the rest is shown to the parties only.
   */
  readonly contents: Readonly<Record<string, LineContent>>;
  /** Hashes, ids, line numbers and instants; never a name. */
  readonly refs?: Readonly<Record<string, string>>;
}

/** Bytes as PostgreSQL reads them out of JSON. */
export const hexBytes = (row: Readonly<Record<string, unknown>>): Record<string, unknown> =>
  Object.fromEntries(
    Object.entries(row).map(([column, value]) => [
      column,
      value instanceof Uint8Array ? `\\x${toHex(value)}` : value,
    ]),
  );

/** The number of the series' next line; nobody else takes it before the commit. */
export const nextLine = async (em: EntityManager, seriesId: string): Promise<number> => {
  const [next] = await em.execute<{ index: string }[]>('select append.next_line(?) as index', [
    seriesId,
  ]);
  return Number(next?.index);
};

/** Appends one line to the series' ledger, under the number that was taken for it. */
export const writeLine = async (
  em: EntityManager,
  random: Random,
  of: { readonly act: string; readonly at: Date; readonly index: number },
  line: NewLedgerLine,
): Promise<void> => {
  const { act, at, index } = of;
  const contents = Object.entries(line.contents).map(([role, content]) => {
    const salt = random.bytes(SALT_LENGTH);
    const commitment =
      'text' in content ? commit(salt, utf8(content.text)) : commitHash(salt, content.sha256);
    return {
      role,
      open: content.open,
      salt,
      content: 'text' in content ? content.text : null,
      commitment: toHex(commitment),
    };
  });
  const text = lineText({
    series: line.seriesId,
    index,
    kind: line.kind,
    at: at.toISOString(),
    act,
    commitments: Object.fromEntries(contents.map((c) => [c.role, c.commitment])),
    refs: line.refs ?? {},
  });
  await em.execute('select append.ledger_line(?, ?, ?, ?, ?, ?::jsonb)', [
    line.seriesId,
    index,
    line.kind,
    text,
    act,
    JSON.stringify(
      contents.map(({ role, open, salt, content }) => hexBytes({ role, open, salt, content })),
    ),
  ]);
};
