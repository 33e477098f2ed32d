import type { ClearanceRequest, ClearanceResponse } from '@/contracts/bench/clearance';
import { type Failure, invalid } from '@/domain/failure';
import { widthIn } from '@/domain/quantity/convert';
import { fail, ok, type Result } from '@/domain/result';
import type { BoreSheet } from '@/domain/tappet/bore-sheet';
import {
  type BoreMeasurement,
  type ClearanceFigures,
  measureBore,
} from '@/domain/tappet/measure-bore';
import { readGrid } from '@/domain/tappet/read-grid';
import { Taker } from './take';

/** One lifter in its bore: clearance, form, drift and uncertainty from the readings as written. */
export function checkClearance(request: ClearanceRequest): Result<ClearanceResponse, Failure> {
  const take = new Taker();
  const sheet = sheetOf(request, take);
  if (take.faults.length > 0) return fail(invalid(take.faults));
  return ok(responseOf(sheet.unit, measureBore(sheet)));
}

function sheetOf(request: ClearanceRequest, take: Taker): BoreSheet {
  const unit = take.unit('/unit', request.unit, 'length');
  const length = (name: 'zeroSize' | 'openingZero' | 'closingZero') => {
    const text = request[name];
    return text === undefined ? undefined : take.quantity(`/${name}`, text, 'length', unit);
  };
  const grid = request.bore.map((row) => row.map((place) => place ?? ''));
  const bore = readGrid(grid, unit, { order: request.order });
  if (!bore.ok) {
    for (const { pointer, detail } of bore.failure) take.refuse(`/bore${pointer}`, detail);
  }
  const comparative = request.method === 'comparative';
  if (!comparative && request.zeroSize !== undefined)
    take.refuse('/zeroSize', 'The absolute method reads diameters and has no zero to set.');
  const count = grid.flat(2).length;
  if (request.order !== undefined && request.order.length !== count)
    take.refuse('/order', `Give a place for each of the ${count} readings.`);
  if (request.order !== undefined && new Set(request.order).size !== request.order.length)
    take.refuse('/order', 'Two readings cannot have the same place in the taking order.');
  return {
    unit,
    method: request.method,
    lifter: (request.lifter ?? []).map((text, i) =>
      take.size(`/lifter/${i}`, text, 'length', unit),
    ),
    bore: bore.ok ? bore.value : [],
    zeroSize: length('zeroSize'),
    zeros: { opening: length('openingZero'), closing: length('closingZero') },
    gauge: {
      kind: 'dial-bore-gauge',
      largerReads: request.largerReads ?? 'plus',
      division:
        request.division === undefined
          ? undefined
          : take.size('/division', request.division, 'length', unit),
    },
    temperatures: temperaturesOf(request, take),
    materials: request.materials && {
      bore: take.material('/materials/bore', request.materials.bore),
      lifter: take.material('/materials/lifter', request.materials.lifter),
    },
  };
}

function temperaturesOf(
  { temperatures }: ClearanceRequest,
  take: Taker,
): BoreSheet['temperatures'] {
  if (temperatures === undefined) return undefined;
  const of = (name: keyof typeof temperatures, text: string) =>
    take.quantity(`/temperatures/${name}`, text, 'temperature');
  const { setting, gauge } = temperatures;
  return {
    bore: of('bore', temperatures.bore),
    lifter: of('lifter', temperatures.lifter),
    setting: setting === undefined ? undefined : of('setting', setting),
    gauge: gauge === undefined ? undefined : of('gauge', gauge),
  };
}

function responseOf(unit: string, bore: BoreMeasurement): ClearanceResponse {
  const figures = ({ mean, min, max }: ClearanceFigures) => ({
    mean: mean.text,
    min: min.text,
    max: max.text,
  });
  const { taper } = bore;
  return {
    unit,
    clearance: bore.clearance && figures(bore.clearance),
    ...(bore.clearanceAt20C && { clearanceAt20C: figures(bore.clearanceAt20C) }),
    outOfRound: bore.outOfRound?.text ?? null,
    taper: taper && {
      depthMeans: taper.depthMeans.text,
      worstAxis: taper.worstAxis.text,
      signed: taper.signed.text,
      shape: taper.shape,
    },
    ...(bore.drift && { drift: bore.drift.text }),
    redo: bore.redo,
    standardUncertainty: widthIn('length', bore.standardUncertainty, unit),
    degreesOfFreedom: bore.degreesOfFreedom,
    shares: bore.budget.map(({ name, share, sentence }) => ({ name, share, sentence })),
    missing: [...bore.missing],
    warnings: [...bore.warnings],
  };
}
