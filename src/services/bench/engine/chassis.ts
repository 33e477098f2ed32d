import type { EngineInputs, EngineResponse } from '@/contracts/bench/engine';
import { weightDistribution } from '@/domain/engine/weights';
import { type Failure, invalid } from '@/domain/failure';
import { fail, ok, type Result } from '@/domain/result';
import { InputTaker } from './input-taker';

export function workOutWeights(inputs: EngineInputs<'weights'>): Result<EngineResponse, Failure> {
  const take = new InputTaker(inputs);
  const unit = take.unitOf('unit', 'mass');
  const corner = (name: keyof typeof inputs) => take.sized(name, 'mass', unit);
  const corners = {
    leftFront: corner('leftFront'),
    rightFront: corner('rightFront'),
    leftRear: corner('leftRear'),
    rightRear: corner('rightRear'),
  };
  if (take.faults.length > 0) return fail(invalid(take.faults));
  const { total, left, rear, cross } = weightDistribution(corners);
  return ok({
    total: total.value.text,
    left: left.value.text,
    rear: rear.value.text,
    cross: cross.value.text,
    unit: total.value.unit,
    working: [total, left, rear, cross].flatMap(({ working }) => working),
    datum: total.datum,
  });
}
