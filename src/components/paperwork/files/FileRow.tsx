import { clockTime } from '../api';
import type { ShownFile } from '../paperwork-props';

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
          {file.keptAt === null ? 'announced, not arrived' : `Sent ${clockTime(file.keptAt)}`}
        </span>
      )}
    </div>
    <button type="button" className="btn-link" onClick={onRemove}>
      Take out<span className="visually-hidden"> {file.name}</span>
    </button>
  </div>
);
