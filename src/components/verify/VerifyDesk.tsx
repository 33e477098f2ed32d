import { type DragEvent, type FormEvent, useEffect, useRef, useState } from 'react';
import { StateSheet } from '../look/StateSheet';
import type { Report } from './report';
import { askServer, checkBytes, checkNumber } from './run-check';
import { StepList } from './StepList';

interface VerifyDeskProps {
  /** The series kept here. */
  readonly series: readonly { readonly slug: string; readonly name: string }[];
  /** From the address: `?series=…&number=…`, as the QR code of a notice gives it. */
  readonly asked: { readonly series: string; readonly number: string };
}

const ask = askServer('');

/** Checks in this browser; nothing that is dropped here is sent anywhere. */
export const VerifyDesk = ({ series, asked }: VerifyDeskProps) => {
  const [busy, setBusy] = useState(false);
  const [report, setReport] = useState<Report>();
  const [number, setNumber] = useState(asked.number);
  const [slug, setSlug] = useState(asked.series || (series[0]?.slug ?? ''));
  const [key, setKey] = useState('');
  const result = useRef<HTMLHeadingElement>(null);
  const begun = useRef(false);

  const run = async (check: () => Promise<Report>) => {
    setBusy(true);
    try {
      setReport(await check());
    } catch {
      const headline = 'The check broke off: the server could not be reached. Try again.';
      setReport({ headline, outcome: 'not checked', steps: [], says: [], keys: [] });
    }
    setBusy(false);
  };
  const take = (file: File | undefined) => {
    if (file === undefined) return;
    void run(async () => checkBytes(new Uint8Array(await file.arrayBuffer()), key.trim(), ask));
  };
  const byNumber = (event: FormEvent) => {
    event.preventDefault();
    void run(() => checkNumber(slug, number.trim(), key.trim(), ask));
  };
  const drop = (event: DragEvent) => {
    event.preventDefault();
    take(event.dataTransfer.files[0]);
  };

  useEffect(() => {
    if (report !== undefined && !busy) result.current?.focus();
  }, [report, busy]);
  useEffect(() => {
    if (begun.current || asked.number === '' || asked.series === '') return;
    begun.current = true;
    void run(() => checkNumber(asked.series, asked.number, '', ask));
  });

  return (
    <div className="stack-lg">
      <fieldset onDragOver={(event) => event.preventDefault()} onDrop={drop}>
        <legend>A file</legend>
        <div className="field">
          <label htmlFor="file">A notice’s PDF, the file in it, or a case file</label>
          <p className="hint" id="file-hint">
            Choose it or drop it here. It is read in this browser and sent nowhere.
          </p>
          <input
            id="file"
            type="file"
            accept=".pdf,.json,application/pdf,application/json"
            aria-describedby="file-hint"
            onChange={(event) => {
              take(event.target.files?.[0]);
              event.target.value = '';
            }}
          />
        </div>
      </fieldset>
      <form onSubmit={byNumber}>
        <fieldset>
          <legend>Or a notice’s number</legend>
          <div className="field">
            <label htmlFor="series">Series</label>
            <select id="series" value={slug} onChange={(event) => setSlug(event.target.value)}>
              {series.map((one) => (
                <option key={one.slug} value={one.slug}>
                  {one.name}
                </option>
              ))}
            </select>
          </div>
          <div className="field">
            <label htmlFor="number">Number of the notice</label>
            <input
              id="number"
              value={number}
              autoComplete="off"
              required
              onChange={(event) => setNumber(event.target.value)}
            />
          </div>
        </fieldset>
        <details className="field">
          <summary>I have the series’ key from somewhere else</summary>
          <label htmlFor="key">The key you wrote down</label>
          <textarea id="key" value={key} onChange={(event) => setKey(event.target.value)} />
          <p className="hint">
            Without it, the key is taken from this site: the check then shows that the record was
            not changed, not that this site is genuine.
          </p>
        </details>
        <p className="actions">
          <button className="btn btn-primary" type="submit" disabled={busy}>
            Check this number
          </button>
        </p>
      </form>
      <div aria-live="polite">{busy && <p>Checking…</p>}</div>
      {report !== undefined && !busy && (
        <StateSheet state="live">
          <div className="stack" data-verdict={report.outcome}>
            <h2 ref={result} tabIndex={-1}>
              {report.headline}
            </h2>
            {report.says.length > 0 && (
              <div>
                <p>What was recorded says – compare it with what you hold:</p>
                {report.says.map((sentence) => (
                  <p key={sentence}>
                    <strong>{sentence}</strong>
                  </p>
                ))}
              </div>
            )}
            <StepList steps={report.steps} />
            {report.keys.length > 0 && (
              <p>
                Checked with{' '}
                {report.keys.map((text) => (
                  <code key={text} className="num break-all">
                    {text}{' '}
                  </code>
                ))}
              </p>
            )}
          </div>
        </StateSheet>
      )}
    </div>
  );
};
