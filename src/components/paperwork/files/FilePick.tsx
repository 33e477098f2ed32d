import { type ReactNode, useRef } from 'react';
import { useDropzone } from 'react-dropzone';

interface FilePickProps {
  readonly accept: Readonly<Record<string, readonly string[]>>;
  readonly label: string;
  /** Spoken with the label: what the file is for. */
  readonly what: string;
  readonly multiple?: boolean;
  /** Whether a device with a camera offers it straight away. */
  readonly camera?: boolean;
  readonly onFiles: (files: readonly File[]) => void;
  readonly children?: ReactNode;
}

/** A place to drop files on, with buttons that open files or the camera. What does not fit is refused by the server, with words. */
export const FilePick = ({
  accept,
  label,
  what,
  multiple = true,
  camera = false,
  onFiles,
  children,
}: FilePickProps) => {
  const taken = useRef<HTMLInputElement>(null);
  const { getRootProps, getInputProps, isDragActive, open } = useDropzone({
    multiple,
    noClick: true,
    noKeyboard: true,
    onDrop: (accepted, rejected) => onFiles([...accepted, ...rejected.map(({ file }) => file)]),
  });
  const types = Object.entries(accept).flat(2).join(',');
  return (
    <div
      {...getRootProps()}
      className={`flex flex-wrap items-center gap-3 ${isDragActive ? 'outline-2 outline-dashed outline-marking' : ''}`}
    >
      {children}
      <input
        {...getInputProps({ accept: types, 'aria-label': `${label}: ${what}` })}
        // The package sets a style of its own, which the policy refuses.
        style={undefined}
        className="visually-hidden"
        tabIndex={-1}
      />
      {camera && (
        <>
          <input
            ref={taken}
            type="file"
            accept="image/*"
            capture="environment"
            className="visually-hidden"
            tabIndex={-1}
            aria-label={`Camera: ${what}`}
            onChange={({ target }) => {
              onFiles([...(target.files ?? [])]);
              target.value = '';
            }}
          />
          <button
            type="button"
            className="btn ml-auto hidden pointer-coarse:inline-flex"
            onClick={() => taken.current?.click()}
          >
            Camera<span className="visually-hidden">: {what}</span>
          </button>
        </>
      )}
      <button type="button" className="btn ml-auto" onClick={open}>
        {label}
        <span className="visually-hidden">: {what}</span>
      </button>
    </div>
  );
};
