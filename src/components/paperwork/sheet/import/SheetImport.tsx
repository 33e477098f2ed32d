import { useMutation } from '@tanstack/react-query';
import { useEffect, useState } from 'react';
import type { ReadSheetAnswer } from '@/contracts/paperwork/sheet';
import type { ColumnMeaning } from '@/domain/paperwork/sheet/header/column-meaning';
import { placeKey, type SheetCell } from '@/domain/paperwork/sheet/sheet-cell';
import type { SheetForm } from '@/domain/rulebook/form/form';
import type { BoreLayout } from '@/domain/tappet/layout/bore-layout';
import { newId, post } from '../../api';
import { failureWords } from '../../files/send-file';
import type { ShownFile } from '../../paperwork-props';
import { ColumnsHeld } from './ColumnsHeld';
import { ImportPreview } from './ImportPreview';
import { useKeptEdits } from './kept-edits';

interface SheetImportProps {
  readonly file: ShownFile;
  readonly form: SheetForm;
  readonly layout: BoreLayout;
  /** What the form holds now. */
  readonly held: readonly SheetCell[];
  readonly onConfirm: (cells: readonly SheetCell[]) => void;
}

/** A file on its way into the form: what its columns hold, what it says, and nothing counts until it is confirmed. */
export const SheetImport = ({ file, form, layout, held, onConfirm }: SheetImportProps) => {
  const { edits, change, forget } = useKeptEdits(file.fileId);
  const { subject } = form;
  const reading = useMutation({
    networkMode: 'always',
    mutationFn: async (said?: { readonly key: string; readonly meaning: ColumnMeaning }) => {
      const path = `/api/files/${file.fileId}`;
      if (said !== undefined) {
        const mapping = { [said.key]: said.meaning };
        await post(`${path}/columns`, { act: newId(), subject, mapping });
      }
      return post<ReadSheetAnswer>(`${path}/sheet`, { subject });
    },
  });
  const { mutate } = reading;
  const [sheet, setSheet] = useState<ReadSheetAnswer>();
  useEffect(() => mutate(undefined, { onSuccess: setSheet }), [mutate]);

  const refused = reading.isError && (
    <p className="field-error" role="alert">
      {failureWords(reading.error)}
    </p>
  );
  if (sheet === undefined) return refused || <p role="status">Reading {file.name} …</p>;
  const cells = sheet.cells.map((cell) => edits.get(placeKey(cell)) ?? cell);
  // A value typed where the file has none is the person's own.
  const added = [...edits.values()].filter(
    (cell) => !sheet.cells.some((one) => placeKey(one) === placeKey(cell)),
  );
  const from = sheet.sheet === '' ? file.name : `Sheet “${sheet.sheet}” of ${file.name}`;
  return (
    <section
      className="my-3 border-2 border-dashed border-ink p-3"
      aria-label={`${file.name}, not confirmed yet`}
    >
      <p role="status">
        <strong>{from}</strong>: {sheet.cells.length} values read, none of them counts yet.
      </p>
      {refused}
      {sheet.notes.length > 0 && (
        <ul className="my-2">
          {sheet.notes.map((note) => (
            <li key={`${note.where} ${note.detail}`}>
              <strong>{note.where}:</strong> {note.detail}
            </li>
          ))}
        </ul>
      )}
      {sheet.columns.length > 0 && (
        <ColumnsHeld
          sheet={sheet}
          form={form}
          onChoose={(key, meaning) => mutate({ key, meaning }, { onSuccess: setSheet })}
        />
      )}
      {cells.length > 0 && (
        <ImportPreview
          file={file}
          sheet={sheet}
          cells={[...cells, ...added]}
          held={held}
          form={form}
          layout={layout}
          onChange={change}
          onConfirm={() => {
            forget();
            onConfirm([...cells, ...added].filter(({ typed }) => typed !== ''));
          }}
        />
      )}
    </section>
  );
};
