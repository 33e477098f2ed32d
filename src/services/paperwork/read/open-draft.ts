import type { Actor } from '@/domain/access/permission';
import { absent, type Failure } from '@/domain/failure';
import type { PaperworkDraft } from '@/domain/paperwork/draft';
import { fail, ok, type Result } from '@/domain/result';
import type { Ports } from '../../ports';
import { findOwnRow } from '../check-paperwork';

/** The draft as the server has it now: a device that was overtaken compares with it. */
export const openDraft = async (
  { db }: Pick<Ports, 'db'>,
  actor: Actor,
  paperworkId: string,
): Promise<
  Result<
    { readonly version: number; readonly draft: PaperworkDraft; readonly savedAt: string },
    Failure
  >
> => {
  const row = await findOwnRow(db, actor, paperworkId);
  return row === undefined
    ? fail(absent())
    : ok({ version: row.version, draft: row.draft, savedAt: row.updatedAt });
};
