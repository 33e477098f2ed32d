import { face, paint } from '../../look/paint';
import type { PlacedPlan, PlanBank } from './plan';
import { type Frame, project, type View } from './projection';

interface MapGroundProps {
  readonly plan: readonly PlanBank[];
  readonly placed: PlacedPlan;
  readonly view: View;
  readonly frame: Frame;
  readonly unit?: string | undefined;
  readonly current?: string | undefined;
}

const Note = ({
  x,
  y,
  end = false,
  children,
}: {
  readonly x: number;
  readonly y: number;
  readonly end?: boolean;
  readonly children: string;
}) => (
  <text
    x={x}
    y={y}
    fontSize={16}
    fontFamily={face.head}
    fontWeight={600}
    fill={paint.ink2}
    stroke={paint.plate}
    strokeWidth={6}
    paintOrder="stroke"
    textAnchor={end ? 'end' : 'start'}
  >
    {children}
  </text>
);

/** Clear length in px that a row leaves for its unit before the first or after the last bore. */
const ROOM = 36;

const Banks = ({ plan, placed, view, frame, unit }: MapGroundProps) =>
  plan.map(({ name, side }) => {
    const isLeft = side === 'left';
    if (view === 'front-up')
      return (
        <Note key={side} x={isLeft ? 20 : frame.width - 22} y={24} end={!isLeft}>
          {unit ? `${name}, ${unit}` : name}
        </Note>
      );
    const edge = { x: isLeft ? frame.width - 20 : 20, end: isLeft };
    const row = placed.rows.find(({ v }) => v === (isLeft ? -1 : 1));
    const hasRoom = row !== undefined && (isLeft ? frame.length - row.to : row.from) >= ROOM;
    const beside = isLeft ? frame.height - 69 : 78;
    return (
      <g key={side}>
        <Note {...edge} y={isLeft ? frame.height - 16 : 26}>
          {name}
        </Note>
        {unit !== undefined && (
          <Note {...edge} y={hasRoom ? beside : isLeft ? frame.height - 36 : 46}>
            {unit}
          </Note>
        )}
      </g>
    );
  });

const Front = ({ view, frame }: { readonly view: View; readonly frame: Frame }) => {
  if (view === 'mini') return null;
  const up = view === 'front-up';
  return (
    <>
      <path
        d={up ? `M${frame.cam} 3l6.5 11h-13z` : `M8 ${frame.cam}l11-6.5v13z`}
        fill={paint.ink}
      />
      <text
        x={up ? frame.cam : 8}
        y={up ? 28 : frame.cam + 24}
        fontSize={16}
        fontFamily={face.head}
        fontWeight={600}
        fill={paint.ink2}
        textAnchor={up ? 'middle' : 'start'}
      >
        Front
      </text>
    </>
  );
};

/** All that lies under the bores: cylinders, rows, the cam line with its ticks, the front, the banks. */
export const MapGround = (props: MapGroundProps) => {
  const { placed, view, frame, current } = props;
  const mini = view === 'mini';
  const camFrom = project(frame, view, mini ? 0 : view === 'front-up' ? 4 : 14, 0);
  const camTo = project(frame, view, frame.length - (mini ? 0 : 6), 0);
  const held = placed.bores.find((bore) => bore.key === current)?.cylinder;
  return (
    <g>
      {placed.cylinders.map(({ number, u, v }) => {
        const centre = project(frame, view, u, v * frame.arc);
        const label = project(frame, view, u, v * frame.number);
        return (
          <g key={number}>
            <circle
              cx={centre.x}
              cy={centre.y}
              r={Math.min(frame.arcRadius, (frame.length / placed.cylinders.length) * 0.93)}
              fill="none"
              stroke={paint.edge}
              strokeWidth={1.3}
            />
            <text
              x={label.x}
              y={label.y + frame.fonts.number * 0.37}
              fontSize={frame.fonts.number}
              fontFamily={face.num}
              fontWeight={700}
              fill={number === held ? paint.marking : paint.ink}
              textAnchor="middle"
            >
              {number}
            </text>
          </g>
        );
      })}
      {placed.rows.map(({ v, from, to }) => {
        const a = project(frame, view, from, v * frame.row);
        const b = project(frame, view, to, v * frame.row);
        return (
          <line key={v} x1={a.x} y1={a.y} x2={b.x} y2={b.y} stroke={paint.hair} strokeWidth={2} />
        );
      })}
      <line
        x1={camFrom.x}
        y1={camFrom.y}
        x2={camTo.x}
        y2={camTo.y}
        stroke={paint.ink}
        strokeWidth={mini ? 1.4 : 2}
        strokeDasharray={mini ? '10 3 2 3' : '18 5 3 5'}
      />
      {!mini &&
        placed.bores.map((bore) => {
          const a = project(frame, view, bore.u, 0);
          const b = project(frame, view, bore.u, bore.v * 7);
          return (
            <line
              key={bore.key}
              x1={a.x}
              y1={a.y}
              x2={b.x}
              y2={b.y}
              stroke={paint.ink}
              strokeWidth={2}
            />
          );
        })}
      <Front view={view} frame={frame} />
      {!mini && <Banks {...props} />}
    </g>
  );
};
