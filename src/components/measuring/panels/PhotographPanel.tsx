import { useState } from 'react';
import type { SentRow } from '@/contracts/inspection/rows';
import { type BorePosition, boreName } from '@/domain/tappet/layout/bore-layout';
import { uuidV7 } from '../queue/uuid-v7';
import type { Part } from '../sheet/parts';
import { photographRow } from '../sheet/rows';
import { placeOf, type Sheet } from '../sheet/sheet';

interface PhotographPanelProps {
  readonly sheet: Sheet;
  readonly part: Part | undefined;
  readonly position: BorePosition;
  readonly record: (rows: readonly SentRow[]) => Promise<boolean>;
  readonly onDone: () => void;
}

const postJson = async (path: string, body: unknown): Promise<Record<string, string>> => {
  const response = await fetch(path, {
    method: 'POST',
    headers: { 'content-type': 'application/json' },
    body: JSON.stringify(body),
  });
  const answer = (await response.json()) as Record<string, string>;
  if (!response.ok) throw new Error(answer['detail'] ?? `The server answered ${response.status}.`);
  return answer;
};

/** A photograph tied to this bore: straight to the object store, then read back before it counts. */
export const PhotographPanel = ({
  sheet,
  part,
  position,
  record,
  onDone,
}: PhotographPanelProps) => {
  const [state, setState] = useState('');
  const send = async (file: File) => {
    const base = `/api/inspections/${sheet.inspectionId}/photographs`;
    const fileId = uuidV7();
    try {
      setState(`Sending ${file.name} …`);
      const expected = await postJson(base, {
        act: uuidV7(),
        fileId,
        item: boreName(position),
        name: file.name,
        type: file.type,
        bytes: file.size,
      });
      const put = await fetch(expected['url'] ?? '', {
        method: 'PUT',
        body: file,
        headers: { 'content-type': expected['type'] ?? file.type },
      });
      // An answer that nobody reads is cut off when the page is left, as if the sending had failed.
      await put.arrayBuffer();
      if (!put.ok) throw new Error('The object store did not take it.');
      const kept = await postJson(`${base}/${fileId}`, { act: uuidV7() });
      if (kept['state'] !== 'kept') throw new Error(kept['refusedBecause'] ?? 'It was refused.');
      const subject = part?.clause?.number ?? '';
      if (await record([photographRow(placeOf(position, 'bore'), subject, fileId)])) onDone();
    } catch (error) {
      setState(
        error instanceof TypeError
          ? 'No connection: keep the photograph on this device and choose it again later.'
          : `Not kept: ${(error as Error).message}`,
      );
    }
  };
  return (
    <div className="field">
      <label htmlFor="photograph">Photograph of {boreName(position)}</label>
      <p className="hint">With a scale and the car number in the picture.</p>
      <input
        id="photograph"
        type="file"
        accept="image/jpeg,image/png,image/webp"
        capture="environment"
        onChange={(event) => {
          const file = event.target.files?.[0];
          if (file !== undefined) void send(file);
        }}
      />
      <p role="status">{state}</p>
    </div>
  );
};
