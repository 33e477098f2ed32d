import type { KeyboardEvent } from 'react';
import type { BoreLayout } from '@/domain/tappet/layout/bore-layout';
import { face, paint } from '../look/paint';
import { displayNumber } from '../look/ReadingValue';
import { type Status, statusWord } from '../look/status';
import { BoreShape, ValveLetter } from './map/BoreShape';
import { MapGround } from './map/MapGround';
import { neighbour, type PlacedBore, placeBores, planOf } from './map/plan';
import { frames, project, projectBox, stepOfKey, type View } from './map/projection';

/** What one bore carries on the map. */
export interface BoreState {
  readonly status: Status;
  /** As written, in the map's unit. */
  readonly value?: string | undefined;
}

export interface BoreMapProps {
  readonly layout: BoreLayout;
  /** By bore name, "5 exhaust"; a bore that is missing here counts as not measured. */
  readonly bores: Readonly<Record<string, BoreState>>;
  readonly view: View;
  /** Unit of every value on the map: "0.001 in". */
  readonly unit?: string;
  /** The unit as it is spoken: "thousandths". */
  readonly unitAloud?: string;
  readonly current?: string | undefined;
  readonly onSelect?: ((key: string) => void) | undefined;
  /** Without script: where each bore leads. */
  readonly hrefs?: Readonly<Record<string, string>> | undefined;
  readonly label?: string;
  readonly className?: string;
}

/** "5 exhaust, too close to call, 1.8 thousandths". */
export const boreSentence = (name: string, state: BoreState, unit = ''): string => {
  const value =
    state.value === undefined ? '' : `, ${displayNumber(state.value)} ${unit}`.trimEnd();
  return `${name}, ${statusWord[state.status]}${value}`;
};

const nothing: BoreState = { status: 'not-measured' };

/** The engine's tappet bores in plan view, each with its mark and value. Second signature of the look. */
export const BoreMap = (props: BoreMapProps) => {
  const { layout, bores: states, view, unit, unitAloud = unit, current, onSelect, hrefs } = props;
  const frame = frames[view];
  const plan = planOf(layout);
  const placed = placeBores(plan, frame.length);
  const radiusOf = (bore: PlacedBore) => Math.min(frame.radius, bore.pitch * 0.44);
  const stateOf = (bore: PlacedBore) => states[bore.key] ?? nothing;
  const stop = placed.bores.some((bore) => bore.key === current) ? current : placed.bores[0]?.key;

  const onKeyDown = (event: KeyboardEvent<SVGSVGElement>) => {
    const step = stepOfKey(view, event.key);
    const from = (event.target as HTMLElement).dataset['bore'];
    if (step === undefined || from === undefined) return;
    event.preventDefault();
    const next = neighbour(placed.bores, from, step);
    if (next === undefined) return;
    for (const target of event.currentTarget.querySelectorAll<HTMLElement>('[data-bore]'))
      if (target.dataset['bore'] === next.key) target.focus();
  };

  const target = (bore: PlacedBore) => {
    const name = boreSentence(bore.key, stateOf(bore), unitAloud);
    const href = hrefs?.[bore.key];
    const isCurrent = bore.key === current;
    if (href !== undefined)
      return (
        <a
          className="bore-target"
          href={href}
          aria-current={isCurrent ? 'true' : undefined}
          data-bore={bore.key}
        >
          <span className="visually-hidden">{name}</span>
        </a>
      );
    if (onSelect === undefined) return null;
    return (
      <button
        type="button"
        className="bore-target"
        aria-current={isCurrent ? 'true' : undefined}
        data-bore={bore.key}
        tabIndex={bore.key === stop ? 0 : -1}
        onClick={() => onSelect(bore.key)}
      >
        <span className="visually-hidden">{name}</span>
      </button>
    );
  };

  const box = (bore: PlacedBore, inner: number) =>
    projectBox(
      frame,
      view,
      [bore.u - bore.pitch / 2, bore.u + bore.pitch / 2],
      [bore.v * inner, bore.v * frame.edge],
    );

  const isStatic = onSelect === undefined && hrefs === undefined;
  const label =
    props.label ?? `Bore map, ${view === 'front-up' ? 'front at the top' : 'front at the left'}`;
  const summary = isStatic
    ? `${label}: ${placed.bores.map((bore) => boreSentence(bore.key, stateOf(bore), unitAloud)).join('; ')}`
    : label;

  return (
    <svg
      className={`bore-map bore-map-${view} ${props.className ?? ''}`.trim()}
      viewBox={`0 0 ${frame.width} ${frame.height}`}
      role={isStatic ? 'img' : 'group'}
      aria-label={summary}
      onKeyDown={isStatic ? undefined : onKeyDown}
    >
      <svg aria-hidden="true" overflow="visible">
        <MapGround
          plan={plan}
          placed={placed}
          view={view}
          frame={frame}
          unit={unit}
          current={current}
        />
        {placed.bores.map((bore) => {
          const state = stateOf(bore);
          const isCurrent = bore.key === current;
          const at = project(frame, view, bore.u, bore.v * frame.row);
          const letter = project(frame, view, bore.u, bore.v * frame.letter);
          const value = project(frame, view, bore.u, bore.v * frame.value);
          const ring = box(bore, 6);
          return (
            <g key={bore.key}>
              {isCurrent && (
                <rect
                  x={ring.x}
                  y={ring.y}
                  width={ring.width}
                  height={ring.height}
                  fill={paint.card}
                  stroke={paint.marking}
                  strokeWidth={view === 'mini' ? 3 : 4}
                />
              )}
              <BoreShape {...at} radius={radiusOf(bore)} status={state.status} />
              <ValveLetter
                {...letter}
                size={frame.fonts.letter}
                valve={bore.valve}
                strong={isCurrent}
                ink={isCurrent ? paint.marking : paint.ink2}
              />
              {frame.fonts.value > 0 && state.value !== undefined && (
                <text
                  x={value.x}
                  y={value.y + frame.fonts.value * 0.37}
                  fontSize={frame.fonts.value}
                  fontFamily={face.num}
                  fontWeight={isCurrent ? 700 : 400}
                  fill={isCurrent ? paint.marking : paint.ink}
                  textAnchor={view === 'front-left' ? 'middle' : bore.v < 0 ? 'end' : 'start'}
                >
                  {displayNumber(state.value)}
                </text>
              )}
            </g>
          );
        })}
      </svg>
      {!isStatic &&
        placed.bores.map((bore) => (
          <foreignObject key={bore.key} {...box(bore, 0)}>
            {target(bore)}
          </foreignObject>
        ))}
    </svg>
  );
};
