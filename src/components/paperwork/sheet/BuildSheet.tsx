import { useState } from 'react';
import { boreMarks } from '@/domain/paperwork/bore-marks';
import { checkingLiftIn } from '@/domain/paperwork/cam/cam-table';
import { cellsOf, type PaperworkDraft, withCells } from '@/domain/paperwork/draft';
import { judgeCells } from '@/domain/paperwork/sheet/judge-cells';
import { placeKey, type SheetCell } from '@/domain/paperwork/sheet/sheet-cell';
import type { ItemRemark } from '@/domain/paperwork/state';
import { emptyValues } from '@/domain/paperwork/still-missing';
import type { ClauseResult } from '@/domain/rulebook/clause-result';
import type { SheetForm } from '@/domain/rulebook/form/form';
import type { RulesInForce } from '@/domain/rulebook/rules-in-force';
import type { BoreLayout } from '@/domain/tappet/layout/bore-layout';
import { BoreMap } from '../../tappet/BoreMap';
import { FilePick } from '../files/FilePick';
import { FileRow } from '../files/FileRow';
import { SendingRow } from '../files/SendingRow';
import type { Files } from '../files/use-files';
import type { ShownFile } from '../paperwork-props';
import { RemarksOn } from '../remarks/RemarksOn';
import { CellsToCorrect } from './CellsToCorrect';
import { Completeness } from './Completeness';
import { LiftCurve } from './cam/LiftCurve';
import { liftsOf } from './cam/lifts-of';
import { ValuesGrid } from './grid/ValuesGrid';
import { SheetImport } from './import/SheetImport';
import { boreStates } from './marks';
import { TemplateLinks } from './TemplateLinks';

const SHEETS = {
  'text/csv': ['.csv', '.txt'],
  'application/vnd.openxmlformats-officedocument.spreadsheetml.sheet': ['.xlsx'],
  'application/pdf': ['.pdf'],
} as const;

interface BuildSheetProps {
  readonly paperworkId: string;
  readonly form: SheetForm;
  /** Whether a mandatory clause asks for it by name. */
  readonly required: boolean;
  readonly layout: BoreLayout;
  readonly draft: PaperworkDraft;
  readonly files: Files;
  readonly rules: Pick<RulesInForce, 'clauses'>;
  readonly results: readonly ClauseResult[];
  readonly remarks: readonly ItemRemark[];
  readonly onChange: (make: (before: PaperworkDraft) => PaperworkDraft) => void;
}

const merged = (
  before: readonly SheetCell[],
  added: readonly SheetCell[],
): readonly SheetCell[] => [
  ...new Map([...before, ...added].map((cell) => [placeKey(cell), cell])).values(),
];

/** One measurement sheet: a file to read from, the bores at a glance, what to correct, and every value. */
export const BuildSheet = (props: BuildSheetProps) => {
  const { paperworkId, form, required, layout, draft, files, rules, results } = props;
  const { remarks, onChange } = props;
  const judged = judgeCells(cellsOf(draft, form.subject));
  const wrong = judged.filter(({ state }) => state !== 'ok');
  const missing = emptyValues(draft, form, layout);
  const own = files.files.filter((file) => file.item === form.subject);
  const sending = files.sending.filter((one) => one.item === form.subject);
  const readable = own.filter((file) => file.state === 'kept' && file.type !== 'application/pdf');
  // Confirmed files that are looked at once more.
  const [again, setAgain] = useState<readonly string[]>([]);
  const take = (cells: readonly SheetCell[]) =>
    onChange((before) =>
      withCells(before, form.subject, merged(cellsOf(before, form.subject), cells)),
    );
  const byBore = form.per === 'bore' || form.per === 'lifter';
  const fromFile = (file: ShownFile): number =>
    judged.filter(({ cell }) => cell.source?.fileId === file.fileId).length;
  const fresh = readable.filter((file) => fromFile(file) === 0);
  return (
    <section aria-labelledby={`sheet-${form.subject}`} id={`sheet-section-${form.subject}`}>
      <div className="section-head ruled">
        <h2 id={`sheet-${form.subject}`}>{form.title}</h2>
        <span className="text-ink-2">
          {form.columns.length === 0
            ? `${own.length} files`
            : `${wrong.length === 0 ? '' : `${wrong.length} to correct, `}${required ? `${missing} missing` : `${missing} not given, optional`}`}
        </span>
      </div>
      <RemarksOn remarks={remarks} item={form.subject} />
      <FilePick
        accept={SHEETS}
        label="Add a sheet"
        what={form.title}
        onFiles={(list) => files.add(list, 'sheet', form.subject)}
      >
        <p className="min-w-0 flex-1 basis-60 py-2 text-ink-2">
          CSV or XLSX as you have it.{' '}
          {form.columns.length > 0 && <TemplateLinks paperworkId={paperworkId} form={form} />}
        </p>
      </FilePick>
      {own.map((file) => (
        <div key={file.fileId}>
          <FileRow file={file} onRemove={() => void files.remove(file.fileId)} />
          {readable.includes(file) && !fresh.includes(file) && !again.includes(file.fileId) && (
            <p className="pb-2">
              {fromFile(file)} of its values count.{' '}
              <button
                type="button"
                className="btn-link"
                onClick={() => setAgain([...again, file.fileId])}
              >
                Read {file.name} again
              </button>
            </p>
          )}
        </div>
      ))}
      {sending.map((one) => (
        <SendingRow key={one.fileId} one={one} files={files} />
      ))}
      {form.columns.length > 0 &&
        readable
          .filter((file) => fresh.includes(file) || again.includes(file.fileId))
          .map((file) => (
            <SheetImport
              key={file.fileId}
              file={file}
              form={form}
              layout={layout}
              held={cellsOf(draft, form.subject)}
              onConfirm={(cells) => {
                setAgain(again.filter((fileId) => fileId !== file.fileId));
                take(cells);
              }}
            />
          ))}
      {form.columns.length > 0 && byBore && (judged.length > 0 || fresh.length === 0) && (
        <BoreMap
          layout={layout}
          view="mini"
          bores={boreStates(boreMarks(layout, form, judged, results))}
          label={`${form.title}, front at the left`}
        />
      )}
      {form.per === 'degree' && judged.length > 0 && (
        <LiftCurve
          readings={liftsOf(judged)}
          checkingLift={checkingLiftIn(rules)}
          label={form.title}
        />
      )}
      <CellsToCorrect cells={wrong} onChange={(cell) => take([cell])} />
      {judged.length > 0 && <Completeness form={form} layout={layout} draft={draft} />}
      {form.columns.length > 0 && (
        <details className="py-3">
          <summary className="min-h-12 cursor-pointer font-semibold">
            Type or see all values
          </summary>
          <ValuesGrid
            form={form}
            layout={layout}
            judged={judged}
            label={form.title}
            onChange={(cell) => take([cell])}
          />
        </details>
      )}
    </section>
  );
};
