import type { Actor } from '@/domain/access/permission';
import { absent, type Failure } from '@/domain/failure';
import { sheetTemplate, type UnitSystem } from '@/domain/paperwork/sheet/template';
import { fail, ok, type Result } from '@/domain/result';
import type { Ports } from '../../../ports';
import { openPaperwork } from '../../read/open-paperwork';
import { XLSX } from '../read-sheet-rows';
import { templateCsv, templateXlsx } from './write-template';

/** A sheet to fill in for this engine by the rules in force, as a file. */
export const makeTemplate = async (
  deps: Pick<Ports, 'db' | 'clock'>,
  actor: Actor,
  input: {
    readonly paperworkId: string;
    readonly subject: string;
    readonly system: UnitSystem;
    readonly as: 'csv' | 'xlsx';
  },
): Promise<
  Result<{ readonly bytes: Uint8Array; readonly type: string; readonly name: string }, Failure>
> => {
  const opened = await openPaperwork(deps, actor, input.paperworkId);
  if (!opened.ok) return opened;
  const { row, checked } = opened.value;
  const form = checked.form.sheets.find((one) => one.subject === input.subject);
  if (form === undefined || form.columns.length === 0) return fail(absent());
  const { layout, carNumber, reference, className, id: paperworkId } = row;
  const about = { carNumber, reference, className, paperworkId };
  const template = sheetTemplate({ form, layout }, about, input.system);
  const name = `${form.sheet}-${carNumber}-${input.system}.${input.as}`;
  return ok(
    input.as === 'xlsx'
      ? { bytes: await templateXlsx(template), type: XLSX, name }
      : { bytes: templateCsv(template), type: 'text/csv; charset=utf-8', name },
  );
};
