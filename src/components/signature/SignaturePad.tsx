import { type PointerEvent, useRef, useState } from 'react';
import { MOST_POINTS, MOST_STROKES, PAD, withPoint } from '@/domain/inspection/strokes';
import { StrokesDrawn } from './StrokesDrawn';

/** Whole units that the pen moves before another point is kept: a name needs no more. */
const STEP = 4;

const pointsIn = (strokes: readonly string[]): number =>
  strokes.reduce((sum, stroke) => sum + stroke.split(' ').length, 0);

const placeOf = (event: PointerEvent<HTMLDivElement>): readonly [number, number] => {
  const box = event.currentTarget.getBoundingClientRect();
  return [
    ((event.clientX - box.left) / box.width) * PAD.width,
    ((event.clientY - box.top) / box.height) * PAD.height,
  ];
};

/**
 * A field of a form, to be drawn on with glove, pen or mouse. Empty is as good: the sign-in signs, and
 * the strokes are kept beside it. They are posted under `name`, one after the other, `;` between two.
 */
export const SignaturePad = ({ name }: { readonly name: string }) => {
  const [strokes, setStrokes] = useState<readonly string[]>([]);
  // A palm that comes down meanwhile is another pointer, and draws nothing.
  const pen = useRef<{ id: number; x: number; y: number } | undefined>(undefined);

  const begin = (event: PointerEvent<HTMLDivElement>) => {
    if (pen.current !== undefined || event.button !== 0) return;
    if (strokes.length >= MOST_STROKES || pointsIn(strokes) >= MOST_POINTS) return;
    event.preventDefault();
    event.currentTarget.setPointerCapture(event.pointerId);
    const [x, y] = placeOf(event);
    pen.current = { id: event.pointerId, x, y };
    setStrokes((before) => [...before, withPoint('', x, y)]);
  };
  const draw = (event: PointerEvent<HTMLDivElement>) => {
    const last = pen.current;
    if (last?.id !== event.pointerId) return;
    const [x, y] = placeOf(event);
    if (Math.hypot(x - last.x, y - last.y) < STEP) return;
    pen.current = { id: event.pointerId, x, y };
    setStrokes((before) =>
      pointsIn(before) >= MOST_POINTS
        ? before
        : [...before.slice(0, -1), withPoint(before.at(-1) ?? '', x, y)],
    );
  };
  const end = (event: PointerEvent<HTMLDivElement>) => {
    if (pen.current?.id === event.pointerId) pen.current = undefined;
  };

  const label =
    strokes.length === 0
      ? 'Signature pad, empty'
      : `Signature pad, ${strokes.length} ${strokes.length === 1 ? 'stroke' : 'strokes'} drawn`;
  return (
    <div className="stack">
      <p className="hint">
        Sign with finger, pen or mouse, or leave it empty. Your sign-in is the signature; the
        strokes are kept beside it with the report and are never published.
      </p>
      <div
        className="signature-pad"
        onPointerDown={begin}
        onPointerMove={draw}
        onPointerUp={end}
        onPointerCancel={end}
      >
        <StrokesDrawn strokes={strokes} label={label} />
      </div>
      <input type="hidden" name={name} value={strokes.join(';')} />
      <p className="actions">
        <button
          type="button"
          className="btn"
          disabled={strokes.length === 0}
          onClick={() => setStrokes([])}
        >
          Clear the pad
        </button>
      </p>
    </div>
  );
};
