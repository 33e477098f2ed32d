import { useMutation } from '@tanstack/react-query';
import { useEffect, useState } from 'react';
import type * as z from 'zod/mini';
import type { readSheetResponse } from '@/contracts/paperwork/sheet';
import type { Mapping } from '@/domain/paperwork/sheet/find-columns';
import type { SheetCell } from '@/domain/paperwork/sheet/sheet-cell';
import type { SheetForm } from '@/domain/rulebook/form/form';
import { post } from '../api';
import { failureWords } from '../files/send-file';
import type { ShownFile } from '../paperwork-props';

interface SheetImportProps {
  readonly file: ShownFile;
  readonly form: SheetForm;
  readonly mapping: Mapping;
  readonly onMapping: (mapping: Mapping) => void;
  readonly onTake: (cells: readonly SheetCell[]) => void;
}

/** What was read out of a sheet: nothing counts until it is taken over. */
export const SheetImport = ({ file, form, mapping, onMapping, onTake }: SheetImportProps) => {
  const [taken, setTaken] = useState(false);
  const reading = useMutation({
    networkMode: 'always',
    mutationFn: (chosen: Mapping) =>
      post<z.infer<typeof readSheetResponse>>(`/api/files/${file.fileId}/sheet`, {
        subject: form.subject,
        mapping: chosen,
      }),
  });
  const { mutate } = reading;
  useEffect(() => mutate(mapping), [mutate, mapping]);

  if (reading.isError)
    return (
      <p className="field-error" role="alert">
        {failureWords(reading.error)}
      </p>
    );
  const sheet = reading.data;
  if (sheet === undefined) return <p role="status">Reading {file.name} …</p>;
  const unknown = sheet.columns.filter(
    ({ meaning, header }) => meaning.kind === 'not-taken' && header !== '',
  );
  const choose = (header: string, quantity: string) => {
    const column = form.columns.find((one) => one.quantity === quantity);
    if (column === undefined) return;
    const meaning = { kind: 'reading', quantity: column.quantity, unit: column.unit } as const;
    onMapping({ ...mapping, [header]: { ...meaning, depth: '', axis: '' } });
  };
  return (
    <div className="my-3 border-2 border-dashed border-ink p-3">
      <p role="status">
        <strong>{file.name}</strong>: {sheet.cells.length} values read.{' '}
        {taken ? 'Taken over below.' : 'They count once you take them over.'}
      </p>
      {sheet.notes.length > 0 && (
        <ul className="my-2">
          {sheet.notes.map((note) => (
            <li key={`${note.where} ${note.detail}`}>
              <strong>{note.where}:</strong> {note.detail}
            </li>
          ))}
        </ul>
      )}
      {unknown.map(({ header }) => (
        <label className="my-2 block" key={header}>
          “{header}” holds{' '}
          <select
            className="input"
            defaultValue=""
            onChange={(event) => choose(header, event.target.value)}
          >
            <option value="">nothing for this sheet</option>
            {form.columns.map((column) => (
              <option key={column.quantity} value={column.quantity}>
                {column.label} ({column.unit})
              </option>
            ))}
          </select>
        </label>
      ))}
      {!taken && sheet.cells.length > 0 && (
        <button
          type="button"
          className="btn"
          onClick={() => {
            onTake(sheet.cells);
            setTaken(true);
          }}
        >
          Take these {sheet.cells.length} values over
        </button>
      )}
    </div>
  );
};
