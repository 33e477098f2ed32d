import { deviceWord } from '../api';
import type { Files, Sending } from './use-files';

const percentOf = ({ share }: Sending): number => Math.floor(share * 100);

/** Where it stands, in words. */
const stateWords = (one: Sending): string => {
  const percent = percentOf(one);
  const words = {
    waiting: one.kept
      ? `On this ${deviceWord()}`
      : 'In this page only, this device has no room: keep the page open',
    sending: percent < 100 ? `Sending ${percent} %` : 'Sent, being read back',
    paused: percent > 0 ? `Paused at ${percent} %` : 'Paused',
    'no-signal': 'No signal: goes on by itself',
    'sign-in': 'Signed out: sign in, then it goes on',
    refused: '',
  };
  return words[one.phase];
};

/** One file on its way. */
export const SendingRow = ({ one, files }: { readonly one: Sending; readonly files: Files }) => (
  <div className="flex flex-wrap items-center gap-3 py-2">
    <div className="min-w-0 flex-1 basis-48 break-words">
      {one.name}
      {one.failed === undefined ? (
        <>
          <div className="text-ink-2">{stateWords(one)}</div>
          <progress
            className="progress"
            max={100}
            value={percentOf(one)}
            aria-label={`Sending ${one.name}`}
          />
        </>
      ) : (
        <div className="field-error" role="alert">
          {one.failed}
        </div>
      )}
    </div>
    {one.phase === 'sign-in' && (
      <a className="btn" href={`/sign-in?return=${encodeURIComponent(location.pathname)}`}>
        Sign in
      </a>
    )}
    {one.phase === 'paused' && (
      <button type="button" className="btn" onClick={() => files.goOn(one.fileId)}>
        Go on<span className="visually-hidden"> with {one.name}</span>
      </button>
    )}
    {(one.phase === 'waiting' || one.phase === 'sending' || one.phase === 'no-signal') && (
      <button type="button" className="btn" onClick={() => files.pause(one.fileId)}>
        Pause<span className="visually-hidden"> {one.name}</span>
      </button>
    )}
    {one.phase === 'refused' && (
      <button type="button" className="btn" onClick={() => files.goOn(one.fileId)}>
        Send again<span className="visually-hidden"> {one.name}</span>
      </button>
    )}
    {(one.phase === 'paused' || one.phase === 'sign-in' || one.phase === 'refused') && (
      <button type="button" className="btn-link" onClick={() => files.drop(one.fileId)}>
        Leave it<span className="visually-hidden">: {one.name}</span>
      </button>
    )}
  </div>
);
