import type { BoreResult } from '@/domain/inspection/assess-inspection';
import type { TemperatureAdvice } from '@/domain/measurement/hold';
import { formatIn } from '@/domain/quantity/format';
import { minus } from '@/domain/quantity/quantity';
import type { BoreMeasurement } from '@/domain/tappet/measure-bore';
import { Caution } from '../look/Caution';

const TITLES: Readonly<Record<Exclude<TemperatureAdvice, 'correct'>, string>> = {
  hold: 'Hold the parts and measure again',
  refuse: 'Too hot for a statement: hold the parts and measure again',
};

const WORDS: Readonly<Record<Exclude<TemperatureAdvice, 'correct'>, string>> = {
  hold: 'The correction to 20 °C is larger than this limit can bear. Let block, lifter and gauge come within 5 °C of each other.',
  refuse:
    'The correction itself is more uncertain than this limit can bear: nothing is stated from these readings. They are kept.',
};

/** "+0.37", what the correction to 20 °C takes off the clearance, in 0.001 in. */
const takenOff = ({ clearance, clearanceAt20C }: BoreMeasurement): string => {
  if (clearance === null || clearanceAt20C === undefined) return '';
  const correction = minus(clearanceAt20C.mean, clearance.mean);
  const sign = correction.value.n > 0n ? '+' : '';
  return ` (${sign}${formatIn(correction, 'thou', 2)} × 0.001 in)`;
};

const at = (bores: readonly BoreResult[], advice: TemperatureAdvice): readonly string[] =>
  bores.flatMap(({ key, sets }) => {
    const last = sets.at(-1)?.measurement;
    return last?.temperatureAdvice === advice ? [`${key}${takenOff(last)}`] : [];
  });

/** Bores to hold and measure again before anything is refused, with their correction; nothing where none is. */
export const HoldAdvice = ({ bores }: { readonly bores: readonly BoreResult[] }) =>
  (['refuse', 'hold'] as const).map((advice) => {
    const named = at(bores, advice);
    return named.length === 0 ? null : (
      <Caution key={advice} title={TITLES[advice]}>
        <p>
          {named.join(', ')}. {WORDS[advice]}
        </p>
        <p>Hot parts and fluids burn: wait, or wear gloves.</p>
      </Caution>
    );
  });
