import type { Actor } from '@/domain/access/permission';
import type { Failure } from '@/domain/failure';
import type { Mapping } from '@/domain/paperwork/sheet/header/find-columns';
import type { ReadSheet } from '@/domain/paperwork/sheet/read-sheet';
import { ok, type Result } from '@/domain/result';
import { openSheetFile, type SheetDeps } from './sheet/file/sheet-file';

/** Reads the numbers of a kept sheet for the form the rules ask for. Nothing counts until the person takes it over. */
export const readSheetFile = async (
  deps: SheetDeps,
  actor: Actor,
  input: {
    readonly fileId: string;
    readonly subject: string;
    readonly mapping?: Mapping | undefined;
  },
): Promise<Result<ReadSheet, Failure>> => {
  const opened = await openSheetFile(deps, actor, input);
  return opened.ok ? ok(opened.value.read) : opened;
};
