import { useEffect, useId, useState } from 'react';
import type { SwapResponse } from '@/contracts/engine/swap';
import { newId, post } from '../../paperwork/api';
import { failureWords } from '../../paperwork/files/send-file';
import { hashFile } from './hash-file';
import { sendPhotograph, watchPhotographs } from './send-photograph';

export interface SwapEntry {
  readonly entryId: string;
  readonly label: string;
  readonly carNumber: string;
  readonly engineReference: string;
  /** Engines that the competitor declares at this time. */
  readonly engines: readonly { readonly id: string; readonly reference: string }[];
}

export interface SwapFormProps {
  readonly entries: readonly SwapEntry[];
}

/** Car, engine, seal, one photograph: what is known is filled in, and one button does it. */
export const SwapForm = ({ entries }: SwapFormProps) => {
  const id = useId();
  const [at, setAt] = useState(0);
  const entry = entries[at];
  const others = (entry?.engines ?? []).filter((one) => one.reference !== entry?.engineReference);
  const [engine, setEngine] = useState('');
  const [name, setName] = useState('');
  const [seal, setSeal] = useState('');
  const [photograph, setPhotograph] = useState<File>();
  const [busy, setBusy] = useState(false);
  const [problem, setProblem] = useState<string>();
  const [done, setDone] = useState<SwapResponse>();
  const [sent, setSent] = useState<string>();
  const [ready, setReady] = useState(false);
  useEffect(() => {
    setReady(true);
    return watchPhotographs(setSent);
  }, []);
  const chosen = engine || (others[0]?.id ?? 'new');
  const missing = [
    chosen === 'new' && name.trim() === '' ? 'the engine’s name' : '',
    seal.trim() === '' ? 'the seal number' : '',
    photograph === undefined ? 'a photograph' : '',
  ].filter((part) => part !== '');

  const swap = async () => {
    if (entry === undefined || photograph === undefined) return;
    setBusy(true);
    setProblem(undefined);
    try {
      const fileId = newId();
      const sha256 = await hashFile(photograph);
      const answer = await post<SwapResponse>('/api/swaps', {
        act: newId(),
        id: newId(),
        entryId: entry.entryId,
        engine:
          chosen === 'new'
            ? { id: newId(), reference: name.trim(), blockCasting: '' }
            : { id: chosen },
        seal: seal.trim(),
        paperworkId: newId(),
        photograph: { fileId, sha256 },
      });
      setDone(answer);
      await sendPhotograph(answer.paperworkId, fileId, photograph);
    } catch (error) {
      setProblem(failureWords(error));
    } finally {
      setBusy(false);
    }
  };

  if (done !== undefined)
    return (
      <div className="stack" role="status">
        <p className="lead">
          <strong>The officials see it now.</strong> {sent ?? 'The photograph is being sent.'}
        </p>
        {done.inspected && (
          <p>An inspection of this car is opened already: it stays with the engine before.</p>
        )}
        <p>The rest of the paperwork is due by {done.dueAt.slice(0, 10)}.</p>
        <p className="actions">
          <a className="btn btn-primary" href={`/paddock/paperwork/${done.paperworkId}`}>
            Go on with the rest
          </a>
          <a className="btn" href="/paddock">
            Later
          </a>
        </p>
      </div>
    );
  return (
    <div className="stack" data-ready={ready ? 'yes' : 'no'}>
      {sent !== undefined && <p role="status">{sent}</p>}
      {entries.length > 1 && (
        <fieldset className="group">
          <legend>Car</legend>
          {entries.map((one, place) => (
            <label className="choice" key={one.entryId}>
              <input
                type="radio"
                name={`${id}-car`}
                checked={place === at}
                onChange={() => {
                  setAt(place);
                  setEngine('');
                }}
              />
              {one.label}
            </label>
          ))}
        </fieldset>
      )}
      {entries.length === 1 && <p>{entry?.label}</p>}
      <fieldset className="group">
        <legend>Engine that goes in</legend>
        {others.map((one) => (
          <label className="choice" key={one.id}>
            <input
              type="radio"
              name={`${id}-engine`}
              checked={chosen === one.id}
              onChange={() => setEngine(one.id)}
            />
            {one.reference}
          </label>
        ))}
        <label className="choice">
          <input
            type="radio"
            name={`${id}-engine`}
            checked={chosen === 'new'}
            onChange={() => setEngine('new')}
          />
          One that is not here yet
        </label>
        {chosen === 'new' && (
          <div className="field border-l-4 border-hair pl-4">
            <label htmlFor={`${id}-name`}>Your name for it</label>
            <input
              id={`${id}-name`}
              maxLength={40}
              autoComplete="off"
              value={name}
              onChange={({ target }) => setName(target.value)}
            />
          </div>
        )}
      </fieldset>
      <div className="field">
        <label htmlFor={`${id}-seal`}>Seal number</label>
        <input
          id={`${id}-seal`}
          className="input-num"
          maxLength={60}
          autoComplete="off"
          value={seal}
          onChange={({ target }) => setSeal(target.value)}
        />
      </div>
      <div className="field">
        <label htmlFor={`${id}-photograph`}>Photograph: the seal and the car number</label>
        <input
          id={`${id}-photograph`}
          type="file"
          accept="image/*"
          capture="environment"
          onChange={({ target }) => setPhotograph(target.files?.[0])}
        />
      </div>
      {problem !== undefined && (
        <p className="field-error" role="alert">
          {problem} What you entered is still here.
        </p>
      )}
      {missing.length > 0 && <p>Still needed: {missing.join(', ')}.</p>}
      <p className="actions">
        <button
          type="button"
          className="btn btn-primary"
          disabled={busy || missing.length > 0}
          onClick={() => void swap()}
        >
          {busy ? 'Being sent' : `Swap the engine of car ${entry?.carNumber ?? ''}`}
        </button>
      </p>
    </div>
  );
};
