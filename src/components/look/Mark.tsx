import { paint } from './paint';
import { type Status, statusWord } from './status';

interface MarkProps {
  readonly status: Status;
  /** Edge of the square box in px. */
  readonly size?: number;
  /** Spoken name. Leave out where the word stands beside the mark: it is then decoration. */
  readonly title?: string | true;
}

/** The strokes of a mark in its 28 × 28 box, for use inside another drawing. */
export const MarkShape = ({ status }: { readonly status: Status }) => {
  const ring = { cx: 14, cy: 14, r: 11.5, fill: 'none' } as const;
  const dashed = (
    <circle {...ring} stroke={paint.ink2} strokeWidth={2.2} strokeDasharray="4.2 3.03" />
  );
  switch (status) {
    case 'within':
      return (
        <g fill="none" stroke={paint.within} strokeWidth={3}>
          <circle {...ring} />
          <path d="M8.2 14.4l4.2 4.2 7.6-8.6" />
        </g>
      );
    case 'outside':
      return (
        <>
          <path d="M2 2h24v24H2z" fill={paint.outside} />
          <path d="M8 8l12 12M20 8L8 20" stroke={paint.onOutside} strokeWidth={3.4} />
        </>
      );
    case 'too-close':
      return (
        <g stroke={paint.onClose}>
          <path d="M14 .8L27.2 14 14 27.2.8 14z" fill={paint.close} strokeWidth={1.8} />
          <path d="M9.2 11.6h9.6M14 6.8v9.6M9.2 19.8h9.6" strokeWidth={2.6} />
        </g>
      );
    case 'not-measured':
      return dashed;
    case 'could-not-be-reached':
      return (
        <>
          {dashed}
          <path d="M8 14h12" stroke={paint.ink2} strokeWidth={2.6} />
        </>
      );
    case 'set-aside':
      return (
        <g fill="none" stroke={paint.ink}>
          <path d="M3.2 3.2h21.6v21.6H3.2z" strokeWidth={2.4} />
          <path d="M8 14h12" strokeWidth={3} />
        </g>
      );
    case 'unreadable':
      return (
        <g stroke={paint.ink}>
          <circle {...ring} fill={paint.tintClose} strokeWidth={2.2} />
          <path
            d="M10.6 11.4a3.5 3.5 0 1 1 5.5 2.9c-1.5 1-2.1 1.6-2.1 3"
            fill="none"
            strokeWidth={2.5}
          />
          <path d="M14 19.2v2.6" strokeWidth={2.7} />
        </g>
      );
  }
};

/** One status mark. */
export const Mark = ({ status, size = 28, title }: MarkProps) => {
  const name = title === true ? statusWord[status] : title;
  const box = { className: 'mark', width: size, height: size, viewBox: '0 0 28 28' } as const;
  return name === undefined ? (
    <svg {...box} aria-hidden="true" focusable="false">
      <MarkShape status={status} />
    </svg>
  ) : (
    <svg {...box} role="img" aria-label={name}>
      <title>{name}</title>
      <MarkShape status={status} />
    </svg>
  );
};
