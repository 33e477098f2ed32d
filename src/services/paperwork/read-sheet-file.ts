import type { Actor } from '@/domain/access/permission';
import { absent, type Failure, failure } from '@/domain/failure';
import { MOST_BYTES } from '@/domain/paperwork/file/limits';
import type { Mapping } from '@/domain/paperwork/sheet/find-columns';
import { type ReadSheet, readBook } from '@/domain/paperwork/sheet/read-sheet';
import { fail, ok, type Result } from '@/domain/result';
import { paperworkForm } from '@/domain/rulebook/form/paperwork-form';
import type { BoreLayout } from '@/domain/tappet/layout/bore-layout';
import { Engine } from '@/entities/paperwork/engine';
import { findOwnFile } from '../file/own-file';
import type { Ports } from '../ports';
import { findRules } from '../rulebook/find-rules';
import { noRules } from './check-paperwork';
import { readSheetRows } from './sheet/read-sheet-rows';

/** Reads the numbers of a kept sheet for the form the rules ask for. Nothing counts until the person takes it over. */
export const readSheetFile = async (
  deps: Pick<Ports, 'db' | 'clock' | 'objects'>,
  actor: Actor,
  input: {
    readonly fileId: string;
    readonly subject: string;
    readonly mapping?: Mapping | undefined;
  },
): Promise<Result<ReadSheet, Failure>> => {
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
  const now = deps.clock.now();
  const standing = await findRules(deps.db, paperwork.seriesId, paperwork.classId, now);
  if (standing === undefined) return fail(noRules());
  const form = paperworkForm(standing.rules).sheets.find((one) => one.subject === input.subject);
  if (form === undefined || form.columns.length === 0) {
    const detail = 'The rules in force ask for no numbers on this sheet.';
    return fail(failure('not-in-this-state', detail));
  }
  const rows = await readSheetRows(await deps.objects.read(file.objectKey, MOST_BYTES.sheet));
  if (!rows.ok) return rows;
  const engine = await deps.db.findOneOrFail(Engine, { id: paperwork.engineId });
  const layout = engine.layout as unknown as BoreLayout;
  const source = { fileId: file.id, name: file.name };
  return ok(readBook(rows.value.grids, { form, layout }, source, input.mapping));
};
