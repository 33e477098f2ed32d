import type { EngineInputs, EngineResponse } from '@/contracts/bench/engine';
import { grossLift, netLift } from '@/domain/engine/cam/lift';
import { durationAtLift, liftTableFault } from '@/domain/engine/cam/lift-table';
import { camTiming, EVENTS_DATUM, type ValveEvents } from '@/domain/engine/cam/valve-events';
import { oneHeightOnly, springRate } from '@/domain/engine/spring';
import { type Failure, invalid } from '@/domain/failure';
import { fail, ok, type Result } from '@/domain/result';
import { answerOf, answersOf } from './answer';
import { InputTaker } from './input-taker';

type Answer = Result<EngineResponse, Failure>;

export function workOutDuration(inputs: EngineInputs<'duration'>): Answer {
  const take = new InputTaker(inputs);
  const unit = inputs.unit === undefined ? 'in' : take.unitOf('unit', 'length');
  const table = {
    checkingLift: take.quantity('/inputs/checkingLift', inputs.checkingLift, 'length', unit),
    points: inputs.table.map(([degree, lift], row) => ({
      degree: take.quantity(`/inputs/table/${row}/0`, degree, 'angle', 'deg'),
      lift: take.quantity(`/inputs/table/${row}/1`, lift, 'length', unit),
    })),
    degreeUncertainty: take.uncertaintyOf('degree', 'angle', 'deg'),
    liftUncertainty: take.uncertaintyOf('lift', 'length', unit),
  };
  const fault = take.faults.length === 0 ? liftTableFault(table) : undefined;
  if (fault !== undefined) take.refuse(`/inputs/table/${fault.row}`, fault.detail);
  if (take.faults.length > 0) return fail(invalid(take.faults));
  const result = durationAtLift(table);
  return ok({
    ...answerOf(result),
    opens: result.opens.text,
    closes: result.closes.text,
    centreline: result.centreline.text,
    warnings: [...result.warnings],
  });
}

export function workOutValveEvents(inputs: EngineInputs<'valve-events'>): Answer {
  const take = new InputTaker(inputs);
  const standardUncertainty = take.uncertaintyOf('event', 'angle', 'deg');
  const event = (name: keyof ValveEvents) => ({
    value: take.input(name, 'angle', 'deg').value,
    standardUncertainty,
  });
  const events = {
    intakeOpens: event('intakeOpens'),
    intakeCloses: event('intakeCloses'),
    exhaustOpens: event('exhaustOpens'),
    exhaustCloses: event('exhaustCloses'),
  };
  if (take.faults.length > 0) return fail(invalid(take.faults));
  return ok({ ...answersOf(camTiming(events)), unit: 'deg', datum: EVENTS_DATUM });
}

export function workOutLift(inputs: EngineInputs<'lift'>): Answer {
  const take = new InputTaker(inputs);
  const unit = take.unitOf('unit', 'length');
  const rocker = {
    lobeLift: take.sized('lobeLift', 'length', unit),
    rockerRatio: take.sized('rockerRatio', 'ratio', '1'),
  };
  const lash = inputs.lash === undefined ? undefined : take.input('lash', 'length', unit);
  if (lash !== undefined && lash.value.value.n < 0n)
    take.refuse('/inputs/lash', 'Lash is zero or more.');
  if (take.faults.length > 0) return fail(invalid(take.faults));
  const gross = grossLift(rocker);
  if (lash === undefined) return ok({ ...answerOf(gross), gross: gross.value.text });
  const net = netLift(rocker, lash);
  return ok({ ...answerOf(net), gross: gross.value.text, net: net.value.text });
}

export function workOutSpringRate(inputs: EngineInputs<'spring-rate'>): Answer {
  const take = new InputTaker(inputs);
  const length = take.unitOf('lengthUnit', 'length');
  const force = take.unitOf('forceUnit', 'force');
  const height = take.uncertaintyOf('height', 'length', length);
  const load = take.uncertaintyOf('load', 'force', force);
  const points = inputs.points.map((point, i) => ({
    height: {
      value: take.size(`/inputs/points/${i}/height`, point.height, 'length', length),
      standardUncertainty: height,
    },
    load: {
      value: take.quantity(`/inputs/points/${i}/load`, point.load, 'force', force),
      standardUncertainty: load,
    },
  }));
  if (take.faults.length === 0 && oneHeightOnly(points))
    take.refuse('/inputs/points', 'A rate needs loads at two different heights.');
  return take.faults.length > 0 ? fail(invalid(take.faults)) : ok(answerOf(springRate(points)));
}
