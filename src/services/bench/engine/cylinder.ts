import type { EngineInputs, EngineResponse } from '@/contracts/bench/engine';
import { roundArea } from '@/domain/engine/area';
import { clearanceVolume, compressionRatio } from '@/domain/engine/compression-ratio';
import { shown } from '@/domain/engine/derived';
import { displacement, roundedUp } from '@/domain/engine/displacement';
import { type Failure, invalid } from '@/domain/failure';
import { fail, ok, type Result } from '@/domain/result';
import { answerOf } from './answer';
import { InputTaker } from './input-taker';

type Answer = Result<EngineResponse, Failure>;

export function workOutDisplacement(inputs: EngineInputs<'displacement'>): Answer {
  const take = new InputTaker(inputs);
  const unit = take.unitOf('unit', 'length');
  const bores = [take.sized('bore', 'length', unit)];
  const stroke = take.sized('stroke', 'length', unit);
  if (take.faults.length > 0) return fail(invalid(take.faults));
  const result = displacement({ bores, stroke, cylinders: inputs.cylinders });
  if (inputs.roundUp === undefined || inputs.roundUp === false) return ok(answerOf(result));
  // U belongs to the value before rounding, so it moves into the working with it.
  const { expandedUncertainty, coverageFactor, ...before } = answerOf(result);
  const value = roundedUp(result.value);
  const spread =
    expandedUncertainty === undefined || coverageFactor === undefined
      ? ''
      : ` ± ${expandedUncertainty.toPrecision(2)} ${before.unit} (k = ${coverageFactor.toFixed(2)})`;
  return ok({
    ...before,
    value: value.text,
    working: [
      ...before.working,
      `Before rounding: ${shown(result.value, 4)}${spread}`,
      `Rounded up to the next whole unit: ${value.text} ${value.unit}`,
    ],
  });
}

export function workOutCompressionRatio(inputs: EngineInputs<'compression-ratio'>): Answer {
  const take = new InputTaker(inputs);
  const length = take.unitOf('lengthUnit', 'length');
  const volume = take.unitOf('volumeUnit', 'volume');
  const parts = {
    bore: take.sized('bore', 'length', length),
    stroke: take.sized('stroke', 'length', length),
    chamber: take.sized('chamber', 'volume', volume),
    piston: take.input('piston', 'volume', volume),
    deck: take.input('deck', 'length', length),
    gasketBore: take.sized('gasketBore', 'length', length),
    gasketThickness: take.input('gasketThickness', 'length', length),
  };
  if (parts.gasketThickness.value.value.n < 0n)
    take.refuse('/inputs/gasketThickness', 'A gasket is no thinner than zero.');
  if (take.faults.length === 0 && clearanceVolume(parts).n <= 0n)
    take.refuse(
      '/inputs/piston',
      'No volume is left above the piston: check dome, deck and chamber.',
    );
  return take.faults.length > 0
    ? fail(invalid(take.faults))
    : ok(answerOf(compressionRatio(parts)));
}

export function workOutArea(inputs: EngineInputs<'area'>): Answer {
  const take = new InputTaker(inputs);
  const diameter = take.sized('diameter', 'length', take.unitOf('unit', 'length'));
  return take.faults.length > 0 ? fail(invalid(take.faults)) : ok(answerOf(roundArea([diameter])));
}
