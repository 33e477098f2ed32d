import { paint } from '@/components/look/paint';
import { PAD, strokePath } from '@/domain/inspection/strokes';

interface StrokesDrawnProps {
  readonly strokes: readonly string[];
  /** What the drawing is, for whoever cannot see it. */
  readonly label: string;
}

/** Pen strokes as they were drawn, over the line that one signs on. */
export const StrokesDrawn = ({ strokes, label }: StrokesDrawnProps) => (
  <svg
    className="strokes"
    viewBox={`0 0 ${PAD.width} ${PAD.height}`}
    role="img"
    aria-label={label}
    fill="none"
    strokeLinecap="round"
    strokeLinejoin="round"
  >
    <path d={`M40 ${PAD.height - 60}H${PAD.width - 40}`} stroke={paint.edge} strokeWidth="2" />
    {strokes.map((stroke, at) => (
      // Strokes are only ever added or cleared together: their place is their name.
      <path key={String(at)} d={strokePath(stroke)} stroke={paint.ink} strokeWidth="5" />
    ))}
  </svg>
);
