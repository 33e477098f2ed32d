import { type Actor, may } from '@/domain/access/permission';
import { isId } from '@/domain/is-id';
import { type PaperworkRow, readPaperwork } from '../../paperwork/read/read-row';
import type { Ports } from '../../ports';

export interface ErasedPaperwork {
  readonly row: PaperworkRow;
  /** The number of the ledger's line that says so. */
  readonly line: number;
  readonly erasedAt: string;
  readonly reason: string;
}

/** What is left to say of erased paperwork, to its owner and the series' officials. */
export const findErasure = async (
  { db }: Pick<Ports, 'db'>,
  actor: Actor,
  paperworkId: string,
): Promise<ErasedPaperwork | undefined> => {
  if (!isId(paperworkId)) return undefined;
  const [row] = await readPaperwork(db, 'p.id = ?', [paperworkId]);
  if (row === undefined) return undefined;
  const own = row.competitorId === actor.personId && may(actor, 'paperwork.hand-in', row.seriesId);
  if (!own && !may(actor, 'paperwork.decide', row.seriesId)) return undefined;
  const [found] = await db.execute<{ line: string; erasedAt: string; reason: string }[]>(
    `select l.index as line, l.line::jsonb ->> 'at' as "erasedAt", c.content::jsonb ->> 'reason' as reason
     from record.ledger_line l
     join record.ledger_content c on c.series_id = l.series_id and c.line_index = l.index
       and c.role = 'erasure'
     where l.series_id = ? and l.kind = 'content-erased'
       and l.line::jsonb #>> '{refs,paperwork}' = ? order by l.index desc limit 1`,
    [row.seriesId, paperworkId],
  );
  return found && { row, ...found, line: Number(found.line) };
};
