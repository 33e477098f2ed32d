import type { ReactNode } from 'react';
import { CarPlate } from '../look/CarPlate';
import { BoreMap, type BoreMapProps } from './BoreMap';

interface MeasuringLayoutProps {
  readonly carNumber: string;
  /** Cells of the top bar: "Engine" over "VR-2231". */
  readonly facts: readonly {
    readonly name: string;
    readonly value: string;
    /** Goes first when the bar is too narrow. */
    readonly minor?: boolean;
  }[];
  readonly saved: ReactNode;
  readonly map: ReactNode;
  readonly tally: ReactNode;
  readonly run: ReactNode;
  readonly work: ReactNode;
  readonly pad: ReactNode;
  /** Left-handed: the pad moves to the left, the map to the right. */
  readonly hand?: 'right' | 'left';
  /** Whether keys are taken: what the device holds has been read. */
  readonly ready?: boolean;
}

/** The measuring screen: map, work and pad side by side, or the map above them when held upright. */
export const MeasuringLayout = (props: MeasuringLayoutProps) => (
  <div
    className="measuring"
    data-hand={props.hand ?? 'right'}
    data-ready={props.ready ? 'yes' : 'no'}
  >
    <header className="bar measuring-bar">
      <CarPlate number={props.carNumber} size="bar" />
      {props.facts.map((fact) => (
        <div className={fact.minor ? 'bar-cell minor' : 'bar-cell'} key={fact.name}>
          <span>{fact.name}</span>
          <span>{fact.value}</span>
        </div>
      ))}
      <div className="bar-end">{props.saved}</div>
    </header>
    <section className="measuring-work" aria-label="This bore">
      {props.work}
    </section>
    <div className="measuring-pad">{props.pad}</div>
    <section className="measuring-run" aria-label="Zero run">
      {props.run}
    </section>
    <section className="measuring-map" aria-label="Bores">
      {props.map}
    </section>
    <div className="measuring-tally">{props.tally}</div>
  </div>
);

/** The map in the view that suits the way the device is held; the style sheet picks one. */
export const TurningBoreMap = (props: Omit<BoreMapProps, 'view' | 'className'>) => (
  <>
    <BoreMap {...props} view="front-up" className="only-wide" />
    <BoreMap {...props} view="front-left" className="only-tall" />
    <BoreMap {...props} view="mini" className="only-narrow" />
  </>
);
