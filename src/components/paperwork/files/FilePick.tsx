import type { ReactNode } from 'react';
import { useDropzone } from 'react-dropzone';

interface FilePickProps {
  readonly accept: Readonly<Record<string, readonly string[]>>;
  readonly label: string;
  /** Spoken with the label: what the file is for. */
  readonly what: string;
  readonly multiple?: boolean;
  readonly onFiles: (files: readonly File[]) => void;
  readonly children?: ReactNode;
}

/** A place to drop files on, with a button that opens camera or files. What does not fit is refused by the server, with words. */
export const FilePick = ({
  accept,
  label,
  what,
  multiple = true,
  onFiles,
  children,
}: FilePickProps) => {
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
      <button type="button" className="btn ml-auto" onClick={open}>
        {label}
        <span className="visually-hidden">: {what}</span>
      </button>
    </div>
  );
};
