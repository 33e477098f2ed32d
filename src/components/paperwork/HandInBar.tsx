import { useEffect, useState } from 'react';
import { NOT_AN_APPROVAL } from '@/domain/paperwork/state';
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

/** Always in view: what is missing, where the work stands, and the one next step. */
export const HandInBar = ({ paperworkId, saved, missing, ready }: HandInBarProps) => {
  // The device and its clock are known in the browser only.
  const [device, setDevice] = useState<string>();
  useEffect(() => setDevice(deviceWord()), []);
  return (
    <div className="foot-bar -mx-4 md:-mx-10">
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
      <p className="min-w-0 flex-1 basis-48">
        {missing !== '' && (
          <>
            <strong>Not yet:</strong> {missing}.{' '}
          </>
        )}
        {missing === '' && saved.state !== 'sent' && <strong>Being saved. </strong>}
        <span className="text-ink-2">{NOT_AN_APPROVAL}</span>
      </p>
      {device !== undefined && (
        <SavedLine
          state={saved.state}
          at={clockTime(saved.at)}
          device={device}
          {...(saved.words === undefined || saved.state === 'sent' ? {} : { unsent: saved.words })}
        />
      )}
    </div>
  );
};
