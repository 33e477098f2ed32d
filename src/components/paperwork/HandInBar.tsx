import { useEffect, useState } from 'react';
import { SavedLine } from '../look/SavedLine';
import { clockTime, deviceWord } from './api';
import type { Saved } from './draft/use-draft';

interface HandInBarProps {
  readonly paperworkId: string;
  readonly saved: Saved;
  /** What is missing, in words; empty when nothing is. */
  readonly missing: string;
  readonly ready: boolean;
}

/** Always in view, in one row on a phone: what is missing, where the work stands, and the one next step. */
export const HandInBar = ({ paperworkId, saved, missing, ready }: HandInBarProps) => {
  // The device and its clock are known in the browser only.
  const [device, setDevice] = useState<string>();
  useEffect(() => setDevice(deviceWord()), []);
  return (
    <div className="foot-bar foot-bar-low -mx-4 md:-mx-10">
      {ready && saved.state === 'sent' ? (
        <a
          className="btn btn-primary btn-compact"
          href={`/paddock/paperwork/${paperworkId}/review`}
        >
          Check and hand in
        </a>
      ) : (
        <button type="button" className="btn btn-compact" disabled>
          Hand in
        </button>
      )}
      <div className="foot-words">
        {missing !== '' && (
          <p>
            <strong>Not yet:</strong> {missing}.
          </p>
        )}
        {missing === '' && saved.state !== 'sent' && <strong>Being saved. </strong>}
        {device !== undefined && (
          <SavedLine
            state={saved.state}
            at={clockTime(saved.at)}
            device={device}
            {...(saved.words === undefined || saved.state === 'sent'
              ? {}
              : { unsent: saved.words })}
          />
        )}
      </div>
    </div>
  );
};
