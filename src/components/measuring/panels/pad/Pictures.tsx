import { useEffect, useState } from 'react';
import { positionKey, type RemarkRow } from '@/domain/inspection/capture/rows';
import { readPicture } from '../../queue/picture-store';
import type { SheetRows } from '../../sheet/recorded';

/** A picture from this device while it holds it, else as the server shows it. */
const Picture = ({ row, bore }: { readonly row: RemarkRow; readonly bore: string }) => {
  const id = row.answer.value ?? '';
  const [source, setSource] = useState<string>();
  useEffect(() => {
    let made: string | undefined;
    let gone = false;
    readPicture(id)
      .then((picture) => {
        if (gone) return;
        made = picture && URL.createObjectURL(new Blob([picture.bytes], { type: picture.type }));
        setSource(made ?? `/api/files/${id}/preview/640`);
      })
      .catch(() => setSource(`/api/files/${id}/preview/640`));
    return () => {
      gone = true;
      if (made !== undefined) URL.revokeObjectURL(made);
    };
  }, [id]);
  return source === undefined ? null : (
    <img className="border border-ink" src={source} alt={`Photograph of ${bore}`} width="140" />
  );
};

/** The photographs of this bore. */
export const Pictures = ({ rows, bore }: { readonly rows: SheetRows; readonly bore: string }) => {
  const pictures = rows.remarks.filter(
    (row) => row.kind === 'photograph' && positionKey(row.place, 'bore') === bore,
  );
  return pictures.length === 0 ? null : (
    <div className="flex flex-wrap gap-2">
      {pictures.map((row) => (
        <Picture key={row.id} row={row} bore={bore} />
      ))}
    </div>
  );
};
