import type { Actor } from '@/domain/access/permission';
import { absent, type Failure, failure } from '@/domain/failure';
import { sha256, toHex, utf8 } from '@/domain/ledger/bytes';
import { canonicalJson } from '@/domain/ledger/canonical';
import { MOST_BYTES } from '@/domain/paperwork/file/limits';
import type { SheetColumn } from '@/domain/paperwork/sheet/header/column-meaning';
import type { Mapping } from '@/domain/paperwork/sheet/header/find-columns';
import { isOwnColumn } from '@/domain/paperwork/sheet/header/read-header';
import { type ReadSheet, readBook } from '@/domain/paperwork/sheet/read-sheet';
import type { WantedSheet } from '@/domain/paperwork/sheet/sheet-cell';
import { fail, ok, type Result } from '@/domain/result';
import { paperworkForm } from '@/domain/rulebook/form/paperwork-form';
import type { BoreLayout } from '@/domain/tappet/layout/bore-layout';
import { Engine } from '@/entities/paperwork/engine';
import type { KeptFile } from '@/entities/paperwork/file';
import { SheetColumns } from '@/entities/paperwork/sheet-columns';
import { findOwnFile } from '../../../file/own-file';
import type { Ports } from '../../../ports';
import { findRules } from '../../../rulebook/find-rules';
import { noRules } from '../../check-paperwork';
import { readSheetRows, type SheetRows } from '../read-sheet-rows';

export type SheetDeps = Pick<Ports, 'db' | 'clock' | 'objects'>;

export interface SheetOfFile {
  readonly file: KeptFile;
  readonly seriesId: string;
  readonly wanted: WantedSheet;
  readonly bytes: Uint8Array;
  readonly content: SheetRows;
  /** As the person's headings are understood now. */
  readonly read: ReadSheet;
}

/** A kept sheet with the form that the rules in force ask for, before anything of it is read. */
const findSheet = async (
  deps: SheetDeps,
  actor: Actor,
  input: { readonly fileId: string; readonly subject?: string | undefined },
): Promise<Result<Pick<SheetOfFile, 'file' | 'seriesId' | 'wanted'>, Failure>> => {
  const found = await findOwnFile(deps.db, actor, input.fileId);
  if (found === undefined) return fail(absent());
  const { file, paperwork } = found;
  if (file.purpose !== 'sheet' || file.state !== 'kept' || !file.objectKey)
    return fail(failure('not-in-this-state', 'This file is no sheet that was kept.'));
  if (file.mediaType === 'application/pdf') {
    const detail =
      'Numbers are not read from PDF. It is kept as it is; type the values in, or add a CSV or XLSX sheet.';
    return fail(failure('unsupported-file', detail));
  }
  const { seriesId, classId, engineId } = paperwork;
  const { subject = file.item } = input;
  const standing = await findRules(deps.db, seriesId, classId, deps.clock.now());
  if (standing === undefined) return fail(noRules());
  const form = paperworkForm(standing.rules).sheets.find((one) => one.subject === subject);
  if (form === undefined || form.columns.length === 0) {
    const detail = 'The rules in force ask for no numbers on this sheet.';
    return fail(failure('not-in-this-state', detail));
  }
  const engine = await deps.db.findOneOrFail(Engine, { id: engineId });
  const layout = engine.layout as unknown as BoreLayout;
  return ok({ file, seriesId, wanted: { form, layout } });
};

/** By which a choice of columns is kept: what kind of sheet it is, and the set of its headings. */
export const columnsKey = (
  { form }: WantedSheet,
  columns: readonly Pick<SheetColumn, 'key' | 'header'>[],
): { readonly sheet: string; readonly headings: string } => ({
  sheet: `${form.sheet} ${form.per}`,
  headings: toHex(
    sha256(
      utf8(
        canonicalJson(
          // The column that we add to a file is none of the person's own.
          [
            ...new Set(columns.flatMap(({ key, header }) => (isOwnColumn(header) ? [] : key))),
          ].sort(),
        ),
      ),
    ),
  ),
});

/**
 * Reads a kept sheet for the form the rules ask for, with what this person said about such columns
 * before; `mapping` goes before that.
 */
export const openSheetFile = async (
  deps: SheetDeps,
  actor: Actor,
  input: {
    readonly fileId: string;
    /** The sheet's subject in the rulebook; what the file was added for where absent. */
    readonly subject?: string | undefined;
    readonly mapping?: Mapping | undefined;
  },
): Promise<Result<SheetOfFile, Failure>> => {
  const found = await findSheet(deps, actor, input);
  if (!found.ok) return found;
  const { file, wanted } = found.value;
  const bytes = await deps.objects.read(file.objectKey ?? '', MOST_BYTES.sheet);
  const content = await readSheetRows(bytes);
  if (!content.ok) return content;
  const source = { fileId: file.id, name: file.name };
  const read = (mapping: Mapping) => readBook(content.value.grids, wanted, source, mapping);
  const bare = read({});
  const remembered = await deps.db.findOne(SheetColumns, {
    personId: actor.personId,
    ...columnsKey(wanted, bare.columns),
  });
  const mapping = { ...Object.fromEntries(remembered?.choices ?? []), ...input.mapping };
  const isPlain = Object.keys(mapping).length === 0;
  return ok({
    ...found.value,
    bytes,
    content: content.value,
    read: isPlain ? bare : read(mapping),
  });
};
