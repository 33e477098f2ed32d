import type { Actor } from '@/domain/access/permission';
import type { Failure } from '@/domain/failure';
import { correctionsOf } from '@/domain/paperwork/sheet/corrections';
import { isOwnColumn } from '@/domain/paperwork/sheet/header/read-header';
import { judgeCells } from '@/domain/paperwork/sheet/judge-cells';
import { ok, type Result } from '@/domain/result';
import type { OpenedFile } from '../../../file/open-file';
import { openSheetFile, type SheetDeps } from '../file/sheet-file';
import { XLSX } from '../read-sheet-rows';
import { annotateCsv } from './annotate-csv';
import { annotateXlsx } from './annotate-xlsx';

const nameOf = (name: string, type: string): string =>
  `${name.replace(/\.[^.]{1,5}$/, '').replace(/ to correct$/, '')} to correct.${type === XLSX ? 'xlsx' : 'csv'}`;

/** The file as the person sent it, with a column that says of each row what is to be corrected and how. */
export const annotateSheet = async (
  deps: SheetDeps,
  actor: Actor,
  input: { readonly fileId: string },
): Promise<Result<OpenedFile, Failure>> => {
  const opened = await openSheetFile(deps, actor, input);
  if (!opened.ok) return opened;
  const { file, bytes, content, read } = opened.value;
  const what = {
    corrections: correctionsOf(read, judgeCells(read.cells)),
    headingRow: read.headingRow,
    ownColumn: read.turned ? undefined : read.columns.find(({ header }) => isOwnColumn(header))?.at,
  };
  const made =
    content.type === XLSX ? annotateXlsx(bytes, read.sheet, what) : annotateCsv(bytes, what);
  return made.ok
    ? ok({ bytes: made.value, type: content.type, name: nameOf(file.name, content.type) })
    : made;
};
