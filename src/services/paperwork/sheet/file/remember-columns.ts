import type { Actor } from '@/domain/access/permission';
import type { Failure } from '@/domain/failure';
import type { Mapping } from '@/domain/paperwork/sheet/header/find-columns';
import { ok, type Result } from '@/domain/result';
import { SheetColumns } from '@/entities/paperwork/sheet-columns';
import { type ActDeps, performAct } from '../../../act/perform-act';
import { columnsKey, openSheetFile, type SheetDeps } from './sheet-file';

/** How many sets of headings are kept for one person; the longest unused goes first. */
const MOST_SETS = 100;

/**
 * Keeps what a person said about the columns of a sheet: the next file of theirs with the same headings
 * is read by it, in whatever paperwork or series. Choices for columns that this file lacks are dropped.
 */
export const rememberColumns = async (
  deps: ActDeps & SheetDeps,
  actor: Actor,
  input: {
    readonly act: string;
    readonly fileId: string;
    readonly subject: string;
    readonly mapping: Mapping;
  },
): Promise<Result<{ readonly remembered: number }, Failure>> => {
  const { act: id, fileId, subject, mapping } = input;
  const opened = await openSheetFile(deps, actor, { fileId, subject });
  if (!opened.ok) return opened;
  const { seriesId, wanted, read } = opened.value;
  const { personId } = actor;
  const keys = new Set(read.columns.map(({ key }) => key));
  const kept = Object.entries(mapping).filter(([key]) => keys.has(key));
  return performAct(
    deps,
    actor,
    { id, kind: 'remember-columns', seriesId, input: { fileId, subject, mapping } },
    async ({ em, at }) => {
      const key = { personId, ...columnsKey(wanted, read.columns) };
      const before = await em.findOne(SheetColumns, key);
      const choices = [...new Map([...(before?.choices ?? []), ...kept])];
      await em.upsert(SheetColumns, { ...key, choices, updatedAt: at });
      await em.execute(
        `delete from public.sheet_columns s where s.person_id = ? and (s.sheet, s.headings) in (
           select o.sheet, o.headings from public.sheet_columns o where o.person_id = ?
           order by o.updated_at desc offset ?)`,
        [personId, personId, MOST_SETS],
      );
      return ok({ remembered: choices.length });
    },
  );
};
