import { type FormEvent, useEffect, useRef, useState } from 'react';
import type { DrawToVerify } from '@/domain/draw/verify-draw';
import { sha256, toHex, utf8 } from '@/domain/ledger/bytes';
import { fetchStages } from './fetch-draw';
import { StageList } from './StageList';
import { type Stage, stagesOf } from './stages';

interface DrawRerunProps {
  readonly series: string;
  readonly drawId: string;
  /** Whether this is the page’s one next step. */
  readonly next: boolean;
  /** The documents as the page was made with; the run in the browser asks for them anew. */
  readonly published: DrawToVerify;
}

type Running =
  | { readonly at: 'page' }
  | { readonly at: 'asking' }
  | { readonly at: 'failed'; readonly why: string }
  | { readonly at: 'run'; readonly stages: readonly Stage[]; readonly shown: number };

/** Runs a draw again in the visitor's own browser, a step at a time. Without script: the steps alone. */
export const DrawRerun = ({ series, drawId, next, published }: DrawRerunProps) => {
  const [running, setRunning] = useState<Running>({ at: 'page' });
  const [ready, setReady] = useState(false);
  const last = useRef<HTMLElement | null>(null);
  const shown = running.at === 'run' ? running.shown : 0;
  useEffect(() => setReady(true), []);
  useEffect(() => {
    if (shown > 0) last.current?.focus();
  }, [shown]);

  const begin = async () => {
    setRunning({ at: 'asking' });
    try {
      const stages = await fetchStages(series, drawId);
      setRunning({ at: 'run', stages, shown: 1 });
    } catch (error) {
      setRunning({ at: 'failed', why: error instanceof Error ? error.message : '' });
    }
  };
  const show = (to: number) => running.at === 'run' && setRunning({ ...running, shown: to });

  return (
    <div className="stack">
      {ready && running.at !== 'run' && (
        <p className="actions">
          <button
            className={next ? 'btn btn-primary' : 'btn'}
            type="button"
            disabled={running.at === 'asking'}
            onClick={() => void begin()}
          >
            Run it again in this browser
          </button>
        </p>
      )}
      <div aria-live="polite">
        {running.at === 'asking' && <p>Asking for the documents…</p>}
        {running.at === 'failed' && (
          <p>It could not be run: {running.why} Below is what the server works out.</p>
        )}
      </div>
      {running.at === 'run' ? (
        <>
          <StageList
            stages={running.stages.slice(0, running.shown)}
            lastRef={(heading) => {
              last.current = heading;
            }}
          />
          {running.shown < running.stages.length ? (
            <p className="actions">
              <button
                className="btn btn-primary"
                type="button"
                onClick={() => show(running.shown + 1)}
              >
                Next step
              </button>
              <button className="btn" type="button" onClick={() => show(running.stages.length)}>
                All steps
              </button>
              <span className="note">
                {running.shown} of {running.stages.length}
              </span>
            </p>
          ) : (
            <Conclusion stages={running.stages} />
          )}
        </>
      ) : (
        <details>
          <summary className="min-h-12 cursor-pointer py-3 font-semibold">
            The steps, as the server works them out
          </summary>
          <StageList stages={stagesOf(published)} />
        </details>
      )}
      {ready && <NotedHash commitment={published.commitment} />}
    </div>
  );
};

const Conclusion = ({ stages }: { readonly stages: readonly Stage[] }) => {
  const failed = stages.filter(({ outcome }) => outcome === 'failed').length;
  const open = stages.filter(({ outcome }) => outcome === 'not checked').length;
  return (
    <p className="text-lg" role="status" data-conclusion={failed > 0 ? 'failed' : 'passed'}>
      <strong>
        {failed > 0
          ? 'Do not rely on this draw: something does not hold.'
          : open > 0
            ? 'What could be checked holds. Come back in a minute for the rest.'
            : 'Every step holds. This browser drew the same cars.'}
      </strong>
    </p>
  );
};

/** Whoever wrote the announcement's hash down before the session compares it here. */
const NotedHash = ({ commitment }: { readonly commitment: string }) => {
  const [noted, setNoted] = useState('');
  const [same, setSame] = useState<boolean>();
  const compare = (event: FormEvent) => {
    event.preventDefault();
    const typed = noted.toLowerCase().replace(/[^0-9a-f]/g, '');
    setSame(typed.length >= 8 && toHex(sha256(utf8(commitment))).startsWith(typed));
  };
  const id = `noted-${commitment.length}-${toHex(sha256(utf8(commitment))).slice(0, 8)}`;
  return (
    <form onSubmit={compare} className="field">
      <label htmlFor={id}>Did you note the announcement’s SHA-256 before the session?</label>
      <p className="hint" id={`${id}-hint`}>
        Its first eight characters or more.
      </p>
      <span className="actions w-full">
        <input
          id={id}
          className="input num max-w-72"
          autoComplete="off"
          spellCheck={false}
          aria-describedby={`${id}-hint`}
          value={noted}
          onChange={(event) => {
            setNoted(event.target.value);
            setSame(undefined);
          }}
        />
        <button className="btn" type="submit">
          Compare
        </button>
      </span>
      <span role="status">
        {same === true && <strong>It is the same announcement.</strong>}
        {same === false && <strong>It is not the announcement shown here.</strong>}
      </span>
    </form>
  );
};
