import { findNumber } from '../number-text';
import { add, negate, type Rational, rational } from '../rational';

const DEGREES = /^([+\-−–]?)\s*(\d+)\s*(?:°|º|deg(?:rees?)?)\s*/i;
const MINUTES = /^([\d.,]+)\s*(?:['′’]|min(?:utes?)?)\s*/i;
const SECONDS = /^([\d.,]+)\s*(?:["″”]|''|sec(?:onds?)?)$/i;

/** Reads degrees with minutes and seconds (`104°30'`, `-7° 30′ 15″`, `104 deg 30 min`) into degrees. */
export const findDegreesAndMinutes = (text: string): Rational | undefined => {
  const degrees = DEGREES.exec(text.trim());
  if (degrees === null) return undefined;
  const afterDegrees = text.trim().slice(degrees[0].length);
  const minutes = MINUTES.exec(afterDegrees);
  if (minutes === null) return undefined;
  const afterMinutes = afterDegrees.slice(minutes[0].length);
  const seconds = SECONDS.exec(afterMinutes);
  if (seconds === null && afterMinutes !== '') return undefined;
  const parts = [part(minutes[1] ?? '', 60n), part(seconds?.[1] ?? '0', 3600n)];
  let sum = rational(BigInt(degrees[2] ?? '0'));
  for (const value of parts) {
    if (value === undefined) return undefined;
    sum = add(sum, value);
  }
  const whole = rational(sum.n, sum.d);
  return degrees[1] === '' || degrees[1] === '+' ? whole : negate(whole);
};

const part = (text: string, perDegree: bigint): Rational | undefined => {
  const value = findNumber(text);
  if (value === undefined || value.n >= 60n * value.d) return undefined;
  return rational(value.n, value.d * perDegree);
};
