import type { PublishedKey } from '@/domain/ledger/verify/follow-keys';
import { keyDocumentShape } from '@/domain/ledger/verify/follow-keys';
import type { Ports } from '../../ports';
import { findCovering } from '../checkpoint/find-checkpoint';
import { proofUnder } from './prove-line';

export interface SeriesKeys {
  /** The key in use, in the form keys are published in. */
  readonly current: string;
  /** Every key in order, each with the line that published it; the first one's `replaces` is empty. */
  readonly published: readonly PublishedKey[];
}

/** The series' keys; nothing before the first is published and covered by a signed head. */
export const findSeriesKeys = async (
  deps: Pick<Ports, 'db'>,
  seriesId: string,
): Promise<SeriesKeys | undefined> => {
  const rows = await deps.db.execute<{ index: string; salt: string; content: string }[]>(
    `select l.index, encode(c.salt, 'hex') as salt, c.content from record.ledger_line l
     join record.ledger_content c
       on c.series_id = l.series_id and c.line_index = l.index and c.role = 'key'
     where l.series_id = ? and l.kind = 'key-published' order by l.index`,
    [seriesId],
  );
  const published: PublishedKey[] = [];
  for (const { index, salt, content } of rows) {
    const head = await findCovering(deps.db, seriesId, Number(index));
    const proof = head && (await proofUnder(deps, seriesId, Number(index), head));
    if (proof !== undefined) published.push({ document: content, salt, proof });
  }
  const newest = published.at(-1);
  if (newest === undefined) return undefined;
  return { current: keyDocumentShape.parse(JSON.parse(newest.document)).key, published };
};
