import { clockTime } from '../api';
import type { ShownFile } from '../paperwork-props';
import type { Files, Sending } from './use-files';

/** One file that is kept or refused. */
export const FileRow = ({
  file,
  onRemove,
}: {
  readonly file: ShownFile;
  readonly onRemove: () => void;
}) => (
  <div className="flex flex-wrap items-center gap-3 py-2">
    {file.picture !== undefined && (
      <img
        className="h-12 w-16 border border-ink object-cover"
        src={file.picture}
        alt={`Photograph ${file.name}`}
        width={64}
        height={48}
      />
    )}
    <div className="min-w-0 flex-1 break-words">
      {file.name}
      <br />
      {file.state === 'refused' ? (
        <span className="field-error">{file.refusedBecause}</span>
      ) : (
        <span className="text-ink-2">
          {file.keptAt === null ? 'announced, not arrived' : `kept ${clockTime(file.keptAt)}`}
        </span>
      )}
    </div>
    <button type="button" className="btn-link" onClick={onRemove}>
      Take out<span className="visually-hidden"> {file.name}</span>
    </button>
  </div>
);

/** One file on its way. */
export const SendingRow = ({ one, files }: { readonly one: Sending; readonly files: Files }) => {
  const percent = Math.round(one.share * 100);
  return (
    <div className="py-2">
      <div className="break-words">{one.file.name}</div>
      {one.failed === undefined ? (
        <>
          <div className="text-ink-2">
            {percent < 100 ? `being sent, ${percent} %` : 'sent, being read back'}
          </div>
          <progress
            className="progress"
            max={100}
            value={percent}
            aria-label={`Sending ${one.file.name}`}
          />
        </>
      ) : (
        <div className="actions">
          <span className="field-error min-w-0 flex-1" role="alert">
            {one.failed}
          </span>
          <button type="button" className="btn" onClick={() => files.retry(one)}>
            Send again
          </button>
          <button type="button" className="btn-link" onClick={() => files.drop(one.fileId)}>
            Leave it
          </button>
        </div>
      )}
    </div>
  );
};
