import type { EntityManager } from '@mikro-orm/postgresql';
import type { Ports } from '../../ports';

export interface OpenContent {
  readonly role: string;
  /** Hexadecimal. */
  readonly salt: string;
  /** The document's exact text; null where the line commits to a file, a PDF. */
  readonly content: string | null;
}

export interface PublicLine {
  readonly index: number;
  /** The exact text. */
  readonly line: string;
  /** What everybody may see of what the line commits to; nothing once it was erased. */
  readonly open: readonly OpenContent[];
}

export const MOST_LINES = 500;

const readOpen = async (em: EntityManager, seriesId: string, from: number, to: number) => {
  const rows = await em.execute<
    { line_index: string; role: string; salt: string; content: string | null }[]
  >(
    `select line_index, role, encode(salt, 'hex') as salt, content from record.ledger_content
     where series_id = ? and line_index >= ? and line_index < ? and open and salt is not null
     order by line_index, role`,
    [seriesId, from, to],
  );
  return rows.map(({ line_index, ...content }) => ({ index: Number(line_index), content }));
};

/** Lines [from, from + count) in order, with the salts and texts of their public content. */
export const listLines = async (
  deps: Pick<Ports, 'db'>,
  asked: { readonly seriesId: string; readonly from: number; readonly count: number },
): Promise<readonly PublicLine[]> => {
  const { seriesId, from } = asked;
  const to = from + Math.min(asked.count, MOST_LINES);
  const rows = await deps.db.execute<{ index: string; line: string }[]>(
    `select index, line from record.ledger_line
     where series_id = ? and index >= ? and index < ? order by index`,
    [seriesId, from, to],
  );
  const open = await readOpen(deps.db, seriesId, from, to);
  return rows.map(({ index, line }) => ({
    index: Number(index),
    line,
    open: open.filter((one) => one.index === Number(index)).map(({ content }) => content),
  }));
};
