import type { Valve } from '@/domain/tappet/layout/bore-layout';
import { MarkShape } from '../../look/Mark';
import { face, paint } from '../../look/paint';
import type { Status } from '../../look/status';

interface BoreShapeProps {
  readonly x: number;
  readonly y: number;
  readonly radius: number;
  readonly status: Status;
}

/** Scale of a mark inside the bore's ring, per px of radius. */
const inRing: Partial<Record<Status, number>> = {
  outside: 1.25 / 23,
  'too-close': 1.64 / 23,
  'set-aside': 1.2 / 23,
  unreadable: 1.5 / 23,
};

/** A bore with its mark: whatever it says, a thin ring stays round it, so that it looks like a bore. */
export const BoreShape = ({ x, y, radius, status }: BoreShapeProps) => {
  const at = `translate(${x} ${y})`;
  const s = radius / 23;
  if (status === 'within')
    return (
      <g transform={at} stroke={paint.within}>
        <circle r={radius - 0.3} fill={paint.card} strokeWidth={radius < 16 ? 2.6 : 4.2} />
        <path
          d="M-11.4.8l8.2 8.2L11.6-7.8"
          transform={`scale(${s})`}
          fill="none"
          strokeWidth={radius < 16 ? 5 : 3.8}
        />
      </g>
    );
  if (status === 'not-measured' || status === 'could-not-be-reached') {
    const dashes = Math.max(8, Math.round((2 * Math.PI * radius) / 7.23));
    const turn = (2 * Math.PI * radius) / dashes;
    return (
      <g transform={at} stroke={paint.ink2} strokeWidth={radius < 16 ? 1.8 : 2.2}>
        <circle
          r={radius}
          fill={paint.card}
          strokeDasharray={`${(turn * 0.58).toFixed(2)} ${(turn * 0.42).toFixed(2)}`}
        />
        {status === 'could-not-be-reached' && (
          <path d={`M${-10 * s} 0h${20 * s}`} strokeWidth={radius < 16 ? 2.2 : 3.4} />
        )}
      </g>
    );
  }
  const k = (inRing[status] ?? 1.2 / 23) * radius;
  return (
    <g transform={at}>
      <circle r={radius + 0.3} fill={paint.card} stroke={paint.ink} strokeWidth={1.5} />
      <g transform={`translate(${-14 * k} ${-14 * k}) scale(${k})`}>
        <MarkShape status={status} />
      </g>
    </g>
  );
};

interface ValveLetterProps {
  readonly x: number;
  readonly y: number;
  readonly size: number;
  readonly valve: Valve;
  /** Bold. */
  readonly strong?: boolean;
  readonly ink?: string;
}

/** E or I beside the cam line. The I has serifs: a bare stroke would read as 1 or as a scribe mark. */
export const ValveLetter = ({
  x,
  y,
  size,
  valve,
  strong = false,
  ink = paint.ink2,
}: ValveLetterProps) => {
  const h = Math.round(size * 3.7) / 10;
  return valve === 'exhaust' ? (
    <text
      x={x}
      y={y + h}
      fontSize={size}
      fontFamily={face.num}
      fontWeight={strong ? 700 : 400}
      fill={ink}
      textAnchor="middle"
    >
      E
    </text>
  ) : (
    <path
      d={`M${x - h * 0.58} ${y - h}h${h * 1.16}M${x - h * 0.58} ${y + h}h${h * 1.16}M${x} ${y - h}v${2 * h}`}
      stroke={ink}
      strokeWidth={(strong ? 0.14 : 0.095) * size}
      fill="none"
    />
  );
};
