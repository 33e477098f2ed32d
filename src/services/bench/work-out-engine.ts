import type { EngineRequest, EngineResponse } from '@/contracts/bench/engine';
import type { Failure } from '@/domain/failure';
import type { Result } from '@/domain/result';
import { workOutWeights } from './engine/chassis';
import { workOutArea, workOutCompressionRatio, workOutDisplacement } from './engine/cylinder';
import {
  workOutDuration,
  workOutLift,
  workOutSpringRate,
  workOutValveEvents,
} from './engine/valve-train';

/** One engine quantity from its inputs, with its datum and the working shown. */
export function workOutEngine(request: EngineRequest): Result<EngineResponse, Failure> {
  switch (request.quantity) {
    case 'displacement':
      return workOutDisplacement(request.inputs);
    case 'compression-ratio':
      return workOutCompressionRatio(request.inputs);
    case 'area':
      return workOutArea(request.inputs);
    case 'duration':
      return workOutDuration(request.inputs);
    case 'valve-events':
      return workOutValveEvents(request.inputs);
    case 'lift':
      return workOutLift(request.inputs);
    case 'spring-rate':
      return workOutSpringRate(request.inputs);
    case 'weights':
      return workOutWeights(request.inputs);
  }
}
