import type { EntityManager } from '@mikro-orm/postgresql';

/** What a message is the receipt of; the line is looked up when it is sent, since it is written last. */
export interface MailReceipt {
  readonly seriesId: string;
  readonly actId: string;
  /** `this paperwork` */
  readonly of: string;
  /** Of the document, hexadecimal. */
  readonly sha256: string;
}

/** The signed note of a head that covers a line of a series, once there can be one. */
export type FindHead = (seriesId: string, line: number) => Promise<string | undefined>;

/** The receipt in words: line, hash and signed head. Whoever keeps it is a witness. */
export const receiptParagraphs = async (
  em: EntityManager,
  { seriesId, actId, of, sha256 }: MailReceipt,
  findHead: FindHead,
): Promise<readonly string[]> => {
  const [row] = await em.execute<{ index: string }[]>(
    'select index from record.ledger_line where series_id = ? and act_id = ? order by index limit 1',
    [seriesId, actId],
  );
  if (row === undefined) throw new Error(`Act ${actId} has no ledger line.`);
  const head = await findHead(seriesId, Number(row.index));
  const words = `Receipt: line ${row.index} of the series’ ledger holds ${of}, SHA-256 ${sha256}.`;
  return head === undefined
    ? [words]
    : [
        `${words} Keep this message: with the signed head below anybody can show later that nothing before it was changed.`,
        head.trimEnd(),
      ];
};
