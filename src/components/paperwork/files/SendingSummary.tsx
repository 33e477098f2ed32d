import type { Files } from './use-files';

/** Of many files on their way: how many, and one button for all. */
export const SendingSummary = ({ files }: { readonly files: Files }) => {
  const { sending } = files;
  if (sending.length < 2) return null;
  const paused = sending.filter(({ phase }) => phase === 'paused');
  const moving = sending.filter(({ phase }) => phase !== 'paused' && phase !== 'refused');
  const noSignal = sending.some(({ phase }) => phase === 'no-signal');
  return (
    <div className="actions border-b border-hair py-3">
      <span className="min-w-0 flex-1 basis-48" role="status">
        {sending.length} files to send{paused.length > 0 && `, ${paused.length} paused`}
        {noSignal && '. No signal: they go on by themselves'}.
      </span>
      {moving.length > 0 && (
        <button
          type="button"
          className="btn"
          onClick={() => {
            for (const { fileId } of moving) files.pause(fileId);
          }}
        >
          Pause all
        </button>
      )}
      {paused.length > 0 && (
        <button
          type="button"
          className="btn"
          onClick={() => {
            for (const { fileId } of paused) files.goOn(fileId);
          }}
        >
          Go on with all
        </button>
      )}
    </div>
  );
};
