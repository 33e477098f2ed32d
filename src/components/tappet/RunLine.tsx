import type { Valve } from '@/domain/tappet/layout/bore-layout';
import { face, paint } from '../look/paint';
import { ValveLetter } from './map/BoreShape';

export interface RunStop {
  /** The bore's name in the domain: "5 exhaust". */
  readonly key: string;
  readonly cylinder: string;
  readonly valve: Valve;
}

export interface RunLineProps {
  /** The opening zero as read, "0.0"; absent while none is taken. */
  readonly opening?: string | undefined;
  /** Bores of this run in taking order. */
  readonly stops: readonly RunStop[];
  /** The bore being read; those before it are done. With the closing zero taken, all are. */
  readonly current?: string | undefined;
  /** The closing zero as read. */
  readonly closing?: string | undefined;
}

const pct = (n: number) => `${Math.round(n * 100) / 100}%`;
const MID = 30;

const Text = ({
  x,
  y,
  children,
  current = false,
  faint = false,
  plain = false,
}: {
  readonly x: string;
  readonly y: number;
  readonly children: string;
  readonly current?: boolean;
  readonly faint?: boolean;
  readonly plain?: boolean;
}) => (
  <text
    x={x}
    y={y}
    fontSize={16}
    fontFamily={plain ? face.text : face.num}
    fontWeight={current ? 700 : plain ? 500 : 400}
    fill={current ? paint.marking : faint ? paint.ink2 : paint.ink}
    textAnchor="middle"
  >
    {children}
  </text>
);

const Post = ({ x, taken }: { readonly x: string; readonly taken: boolean }) => (
  <svg x={x} y={MID} width="1" height="1" overflow="visible" aria-hidden="true">
    <path d="M0 0v11" stroke={taken ? paint.ink : paint.ink2} strokeWidth={taken ? 4 : 2} />
    <path
      d="M-7.5-13h15L0 1z"
      fill={taken ? paint.ink : paint.plate}
      stroke={taken ? paint.ink : paint.ink2}
      strokeWidth={2}
    />
  </svg>
);

const sentence = ({ opening, stops, current, closing }: RunLineProps): string => {
  const names = stops.map((stop) => stop.key).join(', ');
  const at = stops.find((stop) => stop.key === current)?.key;
  return [
    opening === undefined ? 'Opening zero not taken' : `Opening zero ${opening}`,
    `bores ${names}`,
    ...(at === undefined ? [] : [`now at ${at}`]),
    closing === undefined ? 'closing zero not taken yet' : `closing zero ${closing}`,
  ].join('; ');
};

/** A zero run: solid as far as it has come, dashed to the closing post, so that a missing zero is seen. */
export const RunLine = (props: RunLineProps) => {
  const { opening, stops, current, closing } = props;
  const at = stops.findIndex((stop) => stop.key === current);
  const done = closing === undefined ? at : stops.length;
  const last = stops.length + 1;
  const first = 6;
  const place = (index: number) => pct(first + (index / last) * (100 - 2 * first));
  const reached = closing === undefined ? Math.max(0, at + 1) : last;
  // Past ten stops the labels would touch: then every second one is written, the current one always.
  const written = (index: number) => stops.length <= 9 || index === at || index % 2 === 0;
  return (
    <svg className="run-line" width="100%" height="64" role="img" aria-label={sentence(props)}>
      <line
        x1={place(reached)}
        x2={place(last)}
        y1={MID}
        y2={MID}
        stroke={paint.ink2}
        strokeWidth={2}
        strokeDasharray="6 5"
      />
      <line
        x1={place(0)}
        x2={place(reached)}
        y1={MID}
        y2={MID}
        stroke={paint.ink}
        strokeWidth={2}
      />
      <Text x={place(0)} y={11} faint plain>
        opening
      </Text>
      <Post x={place(0)} taken={opening !== undefined} />
      <Text x={place(0)} y={60} plain={opening === undefined} faint={opening === undefined}>
        {opening ?? 'not yet'}
      </Text>
      {stops.map((stop, index) => {
        const x = place(index + 1);
        return (
          <g key={stop.key}>
            {index === at && closing === undefined ? (
              <svg x={x} y={MID} width="1" height="1" overflow="visible" aria-hidden="true">
                <path d="M0-10L10 0 0 10-10 0z" fill={paint.marking} />
              </svg>
            ) : (
              <line
                x1={x}
                x2={x}
                y1={MID - 7}
                y2={MID + 7}
                stroke={index < done ? paint.ink : paint.ink2}
                strokeWidth={index < done ? 3 : 1.6}
              />
            )}
            {written(index) && (
              <svg
                x={x}
                y="60"
                width="1"
                height="1"
                overflow="visible"
                aria-hidden="true"
                className={index % 2 === 1 && index !== at ? 'odd' : undefined}
              >
                <Text x="-7" y={0} current={index === at} faint={index > done}>
                  {stop.cylinder}
                </Text>
                <ValveLetter
                  x={8}
                  y={-6}
                  size={16}
                  valve={stop.valve}
                  strong={index === at}
                  ink={index === at ? paint.marking : index > done ? paint.ink2 : paint.ink}
                />
              </svg>
            )}
          </g>
        );
      })}
      <Text x={place(last)} y={11} faint plain>
        closing
      </Text>
      <Post x={place(last)} taken={closing !== undefined} />
      <Text x={place(last)} y={60} plain={closing === undefined} faint={closing === undefined}>
        {closing ?? 'not yet'}
      </Text>
    </svg>
  );
};
