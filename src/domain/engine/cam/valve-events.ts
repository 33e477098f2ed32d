import { add, div, type Rational, rational, sub } from '../../quantity/rational';
import { type Derived, derive, type Input } from '../derived';

/** The four events as a cam card prints them; an event on the other side of its dead centre is negative. */
export interface ValveEvents {
  /** Before top dead centre. */
  readonly intakeOpens: Input<'angle'>;
  /** After bottom dead centre. */
  readonly intakeCloses: Input<'angle'>;
  /** Before bottom dead centre. */
  readonly exhaustOpens: Input<'angle'>;
  /** After top dead centre. */
  readonly exhaustCloses: Input<'angle'>;
}

export interface CamTiming {
  readonly intakeDuration: Derived<'angle'>;
  readonly exhaustDuration: Derived<'angle'>;
  /** After top dead centre. */
  readonly intakeCentreline: Derived<'angle'>;
  /** Before top dead centre. */
  readonly exhaustCentreline: Derived<'angle'>;
  readonly overlap: Derived<'angle'>;
  /** Camshaft degrees between the two centrelines. */
  readonly lobeSeparation: Derived<'angle'>;
}

type Sizes = { readonly [Name in keyof ValveEvents]: Rational };

const HALF_TURN = rational(180n);
const TWO = rational(2n);

export const EVENTS_DATUM = 'crankshaft degrees at the lift at which the four events were taken';

/** Crankshaft degrees open, from an opening before one dead centre to a closing after the other. */
export const durationOfEvents = (opens: Rational, closes: Rational): Rational =>
  add(add(opens, HALF_TURN), closes);

/** Distance of a flank-to-flank centre from the dead centre that `near` is counted from. */
export const centrelineOfEvents = (duration: Rational, near: Rational): Rational =>
  sub(div(duration, TWO), near);

const intake = (x: Sizes) => durationOfEvents(x.intakeOpens, x.intakeCloses);
const exhaust = (x: Sizes) => durationOfEvents(x.exhaustOpens, x.exhaustCloses);
const intakeCentre = (x: Sizes) => centrelineOfEvents(intake(x), x.intakeOpens);
const exhaustCentre = (x: Sizes) => centrelineOfEvents(exhaust(x), x.exhaustCloses);

/** Durations, centrelines and overlap at the lift at which the events were taken. */
export function camTiming(events: ValveEvents): CamTiming {
  const text = (name: keyof ValveEvents) => events[name].value.text.replace('-', '−');
  const angle = (evaluate: (x: Sizes) => Rational, told: string, after = ''): Derived<'angle'> => {
    const result = derive({
      dimension: 'angle',
      unit: 'deg',
      inputs: { ...events },
      evaluate,
      datum: EVENTS_DATUM,
      working: [],
    });
    const value = result.value.text.replace('-', '−');
    return { ...result, working: [`${told} = ${value} deg${after}`] };
  };
  const [io, ic, eo, ec] = [
    text('intakeOpens'),
    text('intakeCloses'),
    text('exhaustOpens'),
    text('exhaustCloses'),
  ];
  return {
    intakeDuration: angle(intake, `Intake duration: ${io} + 180 + ${ic}`),
    exhaustDuration: angle(exhaust, `Exhaust duration: ${eo} + 180 + ${ec}`),
    intakeCentreline: angle(
      intakeCentre,
      `Intake centreline: half its duration − ${io}`,
      ' after top dead centre',
    ),
    exhaustCentreline: angle(
      exhaustCentre,
      `Exhaust centreline: half its duration − ${ec}`,
      ' before top dead centre',
    ),
    overlap: angle((x) => add(x.intakeOpens, x.exhaustCloses), `Overlap: ${io} + ${ec}`),
    lobeSeparation: angle(
      (x) => div(add(intakeCentre(x), exhaustCentre(x)), TWO),
      'Lobe separation: half the sum of the centrelines',
      ' of the cam',
    ),
  };
}
