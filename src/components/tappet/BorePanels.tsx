import type { Valve } from '@/domain/tappet/layout/bore-layout';
import { GaugeStrip, type GaugeStripProps } from '../look/GaugeStrip';
import { face, paint } from '../look/paint';
import { displayNumber } from '../look/ReadingValue';
import { ValveLetter } from './map/BoreShape';

/** "5 E", its I with serifs. */
const BoreSign = ({ cylinder, valve }: Pick<BoreHeaderProps, 'cylinder' | 'valve'>) => {
  const digits = cylinder.length * 30;
  const width = digits + 40;
  return (
    <svg width={width} height="38" viewBox={`0 0 ${width} 38`} aria-hidden="true">
      <text x="0" y="36" fontSize="46" fontFamily={face.num} fontWeight="700" fill={paint.ink}>
        {cylinder}
      </text>
      <ValveLetter x={digits + 24} y={18.9} size={46} valve={valve} strong ink={paint.ink} />
    </svg>
  );
};

interface BoreHeaderProps {
  readonly cylinder: string;
  readonly valve: Valve;
  readonly clause: string;
  readonly heading: string;
  /** "min 0.0013 in, max 0.0019 in". */
  readonly limits: string;
  readonly advisory: boolean;
  /** Why it is read here, where that says more: "near a limit: the full sheet is asked". */
  readonly why?: string;
}

/** Which bore, under which clause, against which limits. */
export const BoreHeader = (props: BoreHeaderProps) => (
  <div className="bore-head">
    <h2 className="bore-name">
      <BoreSign cylinder={props.cylinder} valve={props.valve} />
      <span className="visually-hidden">{`Bore ${props.cylinder} `}</span>
      <span className="note">{props.valve}</span>
    </h2>
    <div className="bore-limits">
      <p>
        <span className="finding-clause">{props.clause}</span> {props.heading}
      </p>
      <p className="note">{props.limits}</p>
      <p>
        {props.advisory ? (
          <>
            <strong>Advisory:</strong> <span className="note">warns, disqualifies nobody</span>
          </>
        ) : (
          <>
            <strong>Mandatory:</strong>{' '}
            <span className="note">{props.why ?? 'a breach can disqualify'}</span>
          </>
        )}
      </p>
    </div>
  </div>
);

interface LiveReadingProps {
  /** "Below the gallery, third axis". */
  readonly place: string;
  /** What it is read against: "lifter 0.8423 in". */
  readonly against?: string;
  /** What has been typed so far. */
  readonly value: string;
  readonly unit: string;
  /** The number in words, for the read-back: "plus, zero point two". */
  readonly aloud?: string;
}

/** The number that is being read, large enough to be read back across the bay. */
export const LiveReading = ({ place, against, value, unit, aloud }: LiveReadingProps) => (
  <div className="live">
    <div className="live-row">
      <strong>{place}</strong>
      {against !== undefined && <span className="note">{against}</span>}
    </div>
    <div className="live-row">
      <output className="live-value" aria-live="off">
        {value === '' ? '\u00a0' : displayNumber(value)}
      </output>
      <div className="live-side">
        <p>{unit}</p>
        <p className="note" aria-live="polite">
          {aloud ?? '\u00a0'}
        </p>
      </div>
    </div>
  </div>
);

interface ResultStripProps extends Omit<GaugeStripProps, 'size'> {
  readonly name: string;
  /** "1.80", as rounded for display. */
  readonly value: string;
  readonly uncertaintyText: string;
  readonly k: string;
}

/** The computed figure with ± U and its strip: shown once the set is complete. */
export const ResultStrip = ({ name, value, uncertaintyText, k, ...strip }: ResultStripProps) => (
  <div>
    <p className="result-head">
      <span>{name}</span>
      <span className="result-value">
        <b>
          {displayNumber(value)} ± {uncertaintyText}
        </b>{' '}
        <span className="reading-k">{`k = ${k}, ${strip.unit}`}</span>
      </span>
    </p>
    <GaugeStrip {...strip} size="measuring" />
  </div>
);
