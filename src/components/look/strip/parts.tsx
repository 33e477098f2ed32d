import type { Scale } from '@/domain/decision/strip-scale';
import { face, paint } from '../paint';
import { diamondHalf, hatchPath, labelWidth, type Measures, NARROWEST } from './measures';

export interface Labelled {
  readonly value: number;
  /** As it reads: "1.9 max", "max 0.0010 in". */
  readonly label: string;
}

interface PartProps {
  readonly m: Measures;
  readonly scale: Scale;
}

const pct = (place: number) => `${place}%`;

/** Shift in px that keeps a centred label inside the drawing, however narrow its column. */
const inward = (place: number, label: string, m: Measures): number => {
  const half = labelWidth(label, m) / 2;
  const left = (place / 100) * NARROWEST;
  const right = NARROWEST - left;
  return Math.round(Math.max(0, half - left) - Math.max(0, half - right));
};

export const Label = ({
  place,
  label,
  m,
}: {
  readonly place: number;
  readonly label: string;
  readonly m: Measures;
}) => (
  <text
    x={pct(place)}
    dx={inward(place, label, m)}
    y={m.labelY}
    fontSize={m.font}
    fontFamily={face.num}
    fill={paint.ink}
    textAnchor="middle"
  >
    {label}
  </text>
);

export const Hatch = ({
  m,
  scale,
  band,
  tinted,
}: PartProps & { readonly band: readonly [number, number]; readonly tinted: boolean }) => {
  const from = scale.at(band[0]);
  const width = Math.round((scale.at(band[1]) - from) * 100) / 100;
  return (
    <svg
      x={pct(from)}
      y={m.baseY - m.hatch}
      width={pct(width)}
      height={2 * m.hatch}
      aria-hidden="true"
    >
      {tinted && <rect width="100%" height="100%" fill={paint.tintClose} />}
      <path
        d={hatchPath((width / 100) * m.widest, 2 * m.hatch)}
        stroke={paint.ink}
        strokeWidth={m.hatch < 8 ? 1 : 1.5}
      />
    </svg>
  );
};

/** The scribed line with its ticks. */
export const Line = ({ m, scale, tick }: PartProps & { readonly tick: string }) => (
  <>
    {m.tick > 0 &&
      scale.ticks.map((value) => (
        <line
          key={value}
          x1={pct(scale.at(value))}
          x2={pct(scale.at(value))}
          y1={m.baseY - m.tick}
          y2={m.baseY + m.tick}
          stroke={tick}
          strokeWidth={1.5}
        />
      ))}
    <line
      x1="0"
      x2="100%"
      y1={m.baseY}
      y2={m.baseY}
      stroke={m.tick > 0 ? paint.ink : paint.ink2}
      strokeWidth={m.tick > 0 ? 2 : 1.5}
    />
  </>
);

/** One limit: the forbidden bar from the post outward, the post, its label, the word above. */
export const Limit = ({
  m,
  scale,
  side,
  limit,
  word,
  labelled,
}: PartProps & {
  readonly side: 'min' | 'max';
  readonly limit: Labelled;
  readonly word: string;
  readonly labelled: boolean;
}) => {
  const place = scale.at(limit.value);
  const bar =
    side === 'min' ? { x: '0', width: pct(place) } : { x: pct(place), width: pct(100 - place) };
  return (
    <>
      <rect {...bar} y={m.barY} height={m.barHeight} fill={paint.ink} />
      <line
        x1={pct(place)}
        x2={pct(place)}
        y1={m.barY}
        y2={m.postEnd}
        stroke={paint.ink}
        strokeWidth={m.post}
      />
      {m.font > 0 && (
        <>
          <text
            x={side === 'min' ? '0' : '100%'}
            y={m.wordY}
            fontSize={m.font}
            fontFamily={face.text}
            fill={paint.ink2}
            textAnchor={side === 'min' ? 'start' : 'end'}
          >
            {word}
          </text>
          {labelled && <Label place={place} label={limit.label} m={m} />}
        </>
      )}
    </>
  );
};

/** Whiskers, caps and diamond; the label only where the sheet is printed. */
export const Reading = ({
  m,
  scale,
  reading,
  uncertainty,
  ink,
  labelled,
  settle,
}: PartProps & {
  readonly reading: Labelled;
  readonly uncertainty: number;
  readonly ink: string;
  readonly labelled: boolean;
  readonly settle: boolean;
}) => {
  const place = scale.at(reading.value);
  const low = pct(scale.at(reading.value - uncertainty));
  const high = pct(scale.at(reading.value + uncertainty));
  const half = diamondHalf(m, (uncertainty / (scale.to - scale.from)) * m.nominal);
  const y = { y1: m.baseY - m.cap, y2: m.baseY + m.cap };
  return (
    <>
      {uncertainty > 0 && (
        <g stroke={ink} className={settle ? 'settle' : undefined}>
          <line x1={low} x2={high} y1={m.baseY} y2={m.baseY} strokeWidth={m.whisker} />
          <line x1={low} x2={low} {...y} strokeWidth={m.capWidth} />
          <line x1={high} x2={high} {...y} strokeWidth={m.capWidth} />
        </g>
      )}
      <svg x={pct(place)} y={m.baseY} width="1" height="1" overflow="visible" aria-hidden="true">
        <path
          d={`M0-${half}L${half} 0 0 ${half}-${half} 0z`}
          fill={ink}
          stroke={paint.card}
          strokeWidth={1.5}
          paintOrder="stroke"
        />
      </svg>
      {labelled && m.font > 0 && <Label place={place} label={reading.label} m={m} />}
    </>
  );
};
