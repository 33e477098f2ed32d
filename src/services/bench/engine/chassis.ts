import type { EngineInputs, EngineResponse } from '@/contracts/bench/engine';
import { type CornerWeights, weightDistribution } from '@/domain/engine/weights';
import { type Failure, invalid } from '@/domain/failure';
import { fail, ok, type Result } from '@/domain/result';
import { answersOf } from './answer';
import { InputTaker } from './input-taker';

export function workOutWeights(inputs: EngineInputs<'weights'>): Result<EngineResponse, Failure> {
  const take = new InputTaker(inputs);
  const unit = take.unitOf('unit', 'mass');
  const standardUncertainty = take.uncertaintyOf('corner', 'mass', unit);
  const corner = (name: keyof CornerWeights) => ({
    value: take.sized(name, 'mass', unit).value,
    standardUncertainty,
  });
  const corners = {
    leftFront: corner('leftFront'),
    rightFront: corner('rightFront'),
    leftRear: corner('leftRear'),
    rightRear: corner('rightRear'),
  };
  if (take.faults.length > 0) return fail(invalid(take.faults));
  const figures = weightDistribution(corners);
  const { value, datum } = figures.total;
  return ok({ ...answersOf({ ...figures }), unit: value.unit, datum });
}
