import { canonicalJson } from '@/domain/ledger/canonical';
import type { Act } from '../../act/perform-act';

export interface Transfer {
  readonly id: string;
  readonly engineId: string;
  readonly kind: 'sold' | 'lent' | 'returned';
  readonly fromId: string;
  readonly toId: string;
  readonly untilAt: Date | null;
}

/**
 * Enters a change of hands in the record, and a line in the ledger of every series that knows the
 * engine; where none does, of those in which the two race. Names stand in neither; the line's content
 * says who by their ids, to the parties.
 */
export const recordTransfer = async (act: Act, transfer: Transfer): Promise<void> => {
  const { id, engineId, kind, fromId, toId } = transfer;
  const untilAt = transfer.untilAt?.toISOString() ?? null;
  act.append('engine_transfer', [
    { id, engine_id: engineId, kind, from_id: fromId, to_id: toId, until_at: untilAt },
  ]);
  const series = await act.em.execute<{ id: string }[]>(
    'select s as id from append.series_of_engine(?, ?, ?) s order by s',
    [engineId, fromId, toId],
  );
  const said = { kind, from: fromId, to: toId, ...(untilAt !== null && { until: untilAt }) };
  for (const { id: seriesId } of series) {
    act.line({
      seriesId,
      kind: 'engine-transferred',
      contents: { transfer: { text: canonicalJson(said), open: false } },
      refs: { engine: engineId, transfer: id },
    });
  }
};
