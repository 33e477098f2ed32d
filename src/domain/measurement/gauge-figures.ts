import { baseNumber } from '../quantity/convert';
import type { Dimension } from '../quantity/dimension';
import { getUnit } from '../quantity/find-unit';
import { fromDecimalText, mul, type Rational, toNumber, zero } from '../quantity/rational';
import type { Gauge, GaugeKind } from './gauge';
import { ofDivision, rectangular, type UncertaintyComponent } from './uncertainty';

const inches = (text: string): Rational =>
  mul(fromDecimalText(text), getUnit('length', 'in').factor);

type Scaled = Exclude<GaugeKind, 'scale' | 'other'>;

/**
 * Half-widths of error in inches where there is no certificate. Common practice, not a published value:
 * a 0–1 in micrometer of 0.0001 in checked on its standard holds half a division, and so does a dial bore
 * gauge over the few thousandths between zero and reading; a telescoping gauge can be off by 0.001 in, a caliper too.
 */
const HALF_WIDTHS: Readonly<Record<Scaled, Rational>> = {
  micrometer: inches('0.00005'),
  'dial-bore-gauge': inches('0.00005'),
  'telescoping-gauge': inches('0.001'),
  caliper: inches('0.001'),
  'setting-ring': inches('0.00005'),
  'plug-gauge': inches('0.00005'),
};

/** Division in inches where none is stated. Common practice. */
const DIVISIONS: Readonly<Record<Scaled, Rational>> = {
  micrometer: inches('0.0001'),
  'dial-bore-gauge': inches('0.0001'),
  'telescoping-gauge': inches('0.0001'),
  caliper: inches('0.001'),
  'setting-ring': inches('0'),
  'plug-gauge': inches('0'),
};

/** The division in the base, exact; 0 for what is not read off a scale or is not known. */
export const divisionOf = ({ division, kind }: Gauge): Rational =>
  division?.value ?? (kind === 'scale' || kind === 'other' ? zero : DIVISIONS[kind]);

/**
 * Whether anything tells how far a gauge may be off in this dimension: its certificate, its division or, for
 * lengths, common practice on its kind.
 */
export const isErrorKnown = (gauge: Gauge, dimension: Dimension): boolean =>
  gauge.certificate !== undefined ||
  gauge.division !== undefined ||
  (dimension === 'length' && gauge.kind !== 'scale' && gauge.kind !== 'other');

/** From the certificate, else from common practice; a scale or another gauge without one: its division. */
export const calibrationOf = (
  gauge: Gauge,
  words: string,
  sensitivity = 1,
): UncertaintyComponent => {
  const { certificate, kind } = gauge;
  const named = (standardUncertainty: number, degreesOfFreedom: number | null) => ({
    name: `calibration: ${kind}`,
    standardUncertainty,
    sensitivity,
    degreesOfFreedom,
    words,
  });
  if (certificate !== undefined)
    return named(
      baseNumber(certificate.expandedUncertainty) / certificate.coverageFactor,
      certificate.degreesOfFreedom ?? null,
    );
  const halfWidth = kind === 'scale' || kind === 'other' ? divisionOf(gauge) : HALF_WIDTHS[kind];
  return named(rectangular(toNumber(halfWidth)), null);
};

/** Reading to whole divisions; `readings` is how many independent readings make the result (zero and bore: 2). */
export const resolutionOf = (gauge: Gauge, words: string, readings = 1): UncertaintyComponent => ({
  name: `division: ${gauge.kind}`,
  standardUncertainty: ofDivision(toNumber(divisionOf(gauge))),
  sensitivity: Math.sqrt(readings),
  degreesOfFreedom: null,
  words,
});
