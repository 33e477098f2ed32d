import type { EntityManager } from '@mikro-orm/postgresql';

/** An erasure as the ledger says it; everything of it is public. */
export interface PublishedErasure {
  readonly series: string;
  /** The `content-erased` line, byte for byte. */
  readonly line: string;
  /** Hexadecimal. */
  readonly salt: string;
  /** The document that the line commits to. */
  readonly document: string;
}

/** Every erasure of a series, or of all, in the order in which they were made. */
export const listErasures = (em: EntityManager, seriesId?: string): Promise<PublishedErasure[]> =>
  em.execute<PublishedErasure[]>(
    `select l.series_id as series, l.line, encode(c.salt, 'hex') as salt, c.content as document
     from record.ledger_line l
     join record.ledger_content c on c.series_id = l.series_id and c.line_index = l.index
     where l.kind = 'content-erased' and c.role = 'erasure'${seriesId === undefined ? '' : ' and l.series_id = ?'}
     order by l.series_id, l.index`,
    seriesId === undefined ? [] : [seriesId],
  );
