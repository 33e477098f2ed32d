import { type LiftReading, type Lobe, lobesOf } from '@/domain/paperwork/cam/cam-table';
import { asciiIn } from '@/domain/quantity/format';
import type { Quantity } from '@/domain/quantity/quantity';
import { toNumber } from '@/domain/quantity/rational';
import { writtenWords } from '@/domain/rulebook/describe';
import { paint } from '../../../look/paint';

interface LiftCurveProps {
  readonly readings: readonly LiftReading[];
  /** The lift between which the rules take the duration, where they name one. */
  readonly checkingLift?: Quantity<'length'> | undefined;
  readonly label: string;
}

const WIDTH = 640;
const HEIGHT = 220;
const EDGE = 12;

/** `Intake: largest lift 0.3210 in at 110 deg; 246.2 deg between 0.050 in rising and falling.` */
const lobeWords = (
  { lobe, points, largest, duration, noDuration }: Lobe,
  checkingLift: Quantity<'length'> | undefined,
): string => {
  const name = `${lobe.charAt(0).toUpperCase()}${lobe.slice(1)}`;
  const peak = `${points.length} lifts, the largest ${writtenWords(largest.lift)} at ${largest.degree.text} deg`;
  const at = checkingLift === undefined ? '' : writtenWords(checkingLift);
  if (duration !== undefined)
    return `${name}: ${peak}; ${asciiIn(duration.value, 'deg', 1)} deg between ${at} rising and falling.`;
  return noDuration === undefined
    ? `${name}: ${peak}.`
    : `${name}: ${peak}. No duration at ${at}: ${noDuration}`;
};

/** A cam table at a glance: lift over crankshaft angle, a line a lobe, and what each comes to. */
export const LiftCurve = ({ readings, checkingLift, label }: LiftCurveProps) => {
  const lobes = lobesOf(readings, checkingLift);
  if (lobes.length === 0) return null;
  const plain = lobes.map(({ lobe, points }) => ({
    lobe,
    points: points.map(
      ({ degree, lift }) => [toNumber(degree.value), toNumber(lift.value)] as const,
    ),
  }));
  const all = plain.flatMap(({ points }) => points);
  const [from, to] = [Math.min(...all.map(([x]) => x)), Math.max(...all.map(([x]) => x))];
  const most = Math.max(...all.map(([, y]) => y), Number.EPSILON);
  const x = (degree: number) =>
    EDGE + ((degree - from) / Math.max(to - from, Number.EPSILON)) * (WIDTH - 2 * EDGE);
  const y = (lift: number) => HEIGHT - EDGE - (Math.max(lift, 0) / most) * (HEIGHT - 2 * EDGE);
  const words = lobes.map((one) => lobeWords(one, checkingLift));
  return (
    <figure className="my-3">
      <svg
        className="w-full max-w-2xl"
        viewBox={`0 0 ${WIDTH} ${HEIGHT}`}
        role="img"
        aria-label={`${label}, lift over crankshaft angle. ${words.join(' ')}`}
      >
        <line x1={EDGE} y1={y(0)} x2={WIDTH - EDGE} y2={y(0)} stroke={paint.edge} strokeWidth={1} />
        {checkingLift !== undefined && (
          <line
            x1={EDGE}
            y1={y(toNumber(checkingLift.value))}
            x2={WIDTH - EDGE}
            y2={y(toNumber(checkingLift.value))}
            stroke={paint.edge}
            strokeWidth={1}
            strokeDasharray="2 6"
          />
        )}
        {plain.map(({ lobe, points }) => (
          <polyline
            key={lobe}
            points={points.map(([degree, lift]) => `${x(degree)},${y(lift)}`).join(' ')}
            fill="none"
            stroke={lobe === 'intake' ? paint.marking : paint.ink}
            strokeWidth={3}
            strokeDasharray={lobe === 'intake' ? undefined : '10 6'}
          />
        ))}
      </svg>
      <figcaption>
        From {from} to {to} degrees of the crankshaft.
        <ul>
          {lobes.map((one, at) => (
            <li key={one.lobe}>
              <span className="text-ink-2">
                {one.lobe === 'intake' ? 'Solid line. ' : 'Dashed line. '}
              </span>
              {words[at]}
            </li>
          ))}
        </ul>
      </figcaption>
    </figure>
  );
};
