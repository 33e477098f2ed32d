import { useEffect, useState } from 'react';
import { uuidV7 } from '../measuring/queue/uuid-v7';

interface CertificateFileProps {
  readonly seriesId: string;
  readonly gaugeId: string;
  /** The kept file that the register names now; empty where it names none. */
  readonly value: string;
}

interface Told {
  readonly url?: string;
  readonly type?: string;
  readonly state?: string;
  readonly refusedBecause?: string;
  readonly detail?: string;
}

const post = async (path: string, body: unknown): Promise<Told> => {
  const response = await fetch(path, {
    method: 'POST',
    headers: { 'content-type': 'application/json' },
    body: JSON.stringify(body),
  });
  const told = (await response.json()) as Told;
  if (!response.ok) throw new Error(told.detail ?? `The server answered ${response.status}.`);
  return told;
};

/** Sends the certificate's file; the form names it when the gauge is saved. */
export const CertificateFile = ({ seriesId, gaugeId, value }: CertificateFileProps) => {
  const [kept, setKept] = useState(value);
  const [said, setSaid] = useState('');
  const [problem, setProblem] = useState<string>();
  // A file chosen before this listens would go nowhere.
  const [listens, setListens] = useState(false);
  useEffect(() => setListens(true), []);
  const send = async (file: File) => {
    setSaid(`Sending ${file.name} …`);
    setProblem(undefined);
    const base = `/api/gauges/${seriesId}/${gaugeId}/certificates`;
    const fileId = uuidV7();
    try {
      const { url = '', type = file.type } = await post(base, {
        act: uuidV7(),
        fileId,
        name: file.name,
        type: file.type,
        bytes: file.size,
      });
      const put = await fetch(url, {
        method: 'PUT',
        body: file,
        headers: { 'content-type': type },
      });
      await put.arrayBuffer();
      if (!put.ok) throw new Error('The file did not arrive. Send it again.');
      const told = await post(`${base}/${fileId}`, { act: uuidV7() });
      if (told.state !== 'kept') throw new Error(told.refusedBecause ?? 'The file was refused.');
      setKept(fileId);
      setSaid(`${file.name} is kept. Save the gauge, so that the register names it.`);
    } catch (error) {
      setSaid('');
      setProblem(
        error instanceof Error ? error.message : 'The file did not arrive. Send it again.',
      );
    }
  };
  return (
    <div className="field">
      <label htmlFor="certificate-file">The certificate itself</label>
      <p className="hint" id="certificate-hint">
        A PDF or a photograph of it, at most 10 MB.{' '}
        {kept !== '' && (
          <a href={`/api/files/${kept}/original`}>
            {said === '' ? 'The file on record' : 'The new file'}
          </a>
        )}
      </p>
      {problem !== undefined && (
        <p className="field-error" id="certificate-error" role="alert">
          {problem}
        </p>
      )}
      <input
        id="certificate-file"
        type="file"
        disabled={!listens}
        accept="application/pdf,image/jpeg,image/png,image/webp"
        aria-describedby={
          problem === undefined ? 'certificate-hint' : 'certificate-hint certificate-error'
        }
        onChange={(event) => {
          const file = event.target.files?.[0];
          if (file !== undefined) void send(file);
        }}
      />
      <input type="hidden" name="certificateFile" value={kept} />
      <p role="status">{said}</p>
    </div>
  );
};
