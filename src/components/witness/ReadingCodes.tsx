import { create } from 'qrcode';
import { useState } from 'react';

const QUIET = 4;

const drawn = (text: string) => {
  const { modules } = create(text, { errorCorrectionLevel: 'M' });
  const rows = Array.from({ length: modules.size }, (_, y) =>
    Array.from({ length: modules.size }, (_, x) =>
      modules.get(y, x) ? `M${x + QUIET} ${y + QUIET}h1v1h-1z` : '',
    ).join(''),
  );
  return { side: modules.size + 2 * QUIET, path: rows.join('') };
};

/** Dark on light in every theme, as scanners want it. */
export const Code = ({ text, label }: { readonly text: string; readonly label: string }) => {
  const { side, path } = drawn(text);
  return (
    <svg
      className="qr"
      viewBox={`0 0 ${side} ${side}`}
      role="img"
      aria-label={label}
      shapeRendering="crispEdges"
    >
      <path d={`M0 0h${side}v${side}H0z`} fill="#ffffff" />
      <path d={path} fill="#000000" />
    </svg>
  );
};

/** The readings as codes, one large at a time; each is plain text and needs no signal. */
export const ReadingCodes = ({ codes }: { readonly codes: readonly string[] }) => {
  const [at, setAt] = useState(0);
  const shown = Math.min(at, codes.length - 1);
  const text = codes[shown] ?? '';
  return (
    <div className="stack">
      <p aria-live="polite">
        <strong>
          Code {shown + 1} of {codes.length}.
        </strong>{' '}
        Any phone’s camera reads it as text, without signal. A picture of it is a copy as well.
      </p>
      <div className="witness-code">
        <Code text={text} label={`Readings, code ${shown + 1} of ${codes.length}`} />
      </div>
      {codes.length > 1 && (
        <p className="actions">
          <button
            className="btn"
            type="button"
            disabled={shown === 0}
            onClick={() => setAt(shown - 1)}
          >
            Code before
          </button>
          <button
            className="btn"
            type="button"
            disabled={shown === codes.length - 1}
            onClick={() => setAt(shown + 1)}
          >
            Next code
          </button>
        </p>
      )}
      <details>
        <summary>What it says</summary>
        <pre className="num whitespace-pre-wrap">{text}</pre>
      </details>
    </div>
  );
};
