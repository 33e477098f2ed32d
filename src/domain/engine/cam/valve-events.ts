import type { Quantity } from '../../quantity/quantity';
import { add, div, type Rational, rational, sub } from '../../quantity/rational';
import { writtenOut } from '../derived';

/** The four events as a cam card prints them; an event on the other side of its dead centre is negative. */
export interface ValveEvents {
  /** Before top dead centre. */
  readonly intakeOpens: Quantity<'angle'>;
  /** After bottom dead centre. */
  readonly intakeCloses: Quantity<'angle'>;
  /** Before bottom dead centre. */
  readonly exhaustOpens: Quantity<'angle'>;
  /** After top dead centre. */
  readonly exhaustCloses: Quantity<'angle'>;
}

export interface CamTiming {
  readonly intakeDuration: Quantity<'angle'>;
  readonly exhaustDuration: Quantity<'angle'>;
  /** After top dead centre. */
  readonly intakeCentreline: Quantity<'angle'>;
  /** Before top dead centre. */
  readonly exhaustCentreline: Quantity<'angle'>;
  readonly overlap: Quantity<'angle'>;
  /** Camshaft degrees between the two centrelines. */
  readonly lobeSeparation: Quantity<'angle'>;
  readonly working: readonly string[];
}

const HALF_TURN = rational(180n);
const TWO = rational(2n);
const deg = (value: Rational): Quantity<'angle'> => writtenOut('angle', value, 'deg');

/** Crankshaft degrees open, from an opening before one dead centre to a closing after the other. */
export const durationOfEvents = (opens: Rational, closes: Rational): Rational =>
  add(add(opens, HALF_TURN), closes);

/** Distance of a flank-to-flank centre from the dead centre that `near` is counted from. */
export const centrelineOfEvents = (duration: Rational, near: Rational): Rational =>
  sub(div(duration, TWO), near);

/** Durations, centrelines and overlap at the lift at which the events were taken. */
export function camTiming(events: ValveEvents): CamTiming {
  const [io, ic, eo, ec] = [
    events.intakeOpens.value,
    events.intakeCloses.value,
    events.exhaustOpens.value,
    events.exhaustCloses.value,
  ];
  const intake = durationOfEvents(io, ic);
  const exhaust = durationOfEvents(eo, ec);
  const intakeCentre = centrelineOfEvents(intake, io);
  const exhaustCentre = centrelineOfEvents(exhaust, ec);
  const timing = {
    intakeDuration: deg(intake),
    exhaustDuration: deg(exhaust),
    intakeCentreline: deg(intakeCentre),
    exhaustCentreline: deg(exhaustCentre),
    overlap: deg(add(io, ec)),
    lobeSeparation: deg(div(add(intakeCentre, exhaustCentre), TWO)),
  };
  const text = (quantity: Quantity<'angle'>) => quantity.text.replace('-', '−');
  return {
    ...timing,
    working: [
      `Intake duration: ${text(events.intakeOpens)} + 180 + ${text(events.intakeCloses)} = ${text(timing.intakeDuration)} deg`,
      `Exhaust duration: ${text(events.exhaustOpens)} + 180 + ${text(events.exhaustCloses)} = ${text(timing.exhaustDuration)} deg`,
      `Intake centreline: ${text(timing.intakeDuration)} ÷ 2 − ${text(events.intakeOpens)} = ${text(timing.intakeCentreline)} deg after top dead centre`,
      `Exhaust centreline: ${text(timing.exhaustDuration)} ÷ 2 − ${text(events.exhaustCloses)} = ${text(timing.exhaustCentreline)} deg before top dead centre`,
      `Overlap: ${text(events.intakeOpens)} + ${text(events.exhaustCloses)} = ${text(timing.overlap)} deg`,
    ],
  };
}
