import { type Actor, may } from '@/domain/access/permission';
import { ColumnChoice } from '@/entities/event/column-choice';
import type { Ports } from '../../ports';
import type { ColumnChoices } from './columns';

/** The columns that were chosen for a series' last file of entries. */
export const findColumns = async (
  deps: Pick<Ports, 'db'>,
  actor: Actor,
  seriesId: string,
): Promise<ColumnChoices> => {
  if (!may(actor, 'event.manage', seriesId)) return {};
  const found = await deps.db.findOne(ColumnChoice, { seriesId, purpose: 'entries' });
  return found?.columns ?? {};
};
