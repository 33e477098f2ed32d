import type { TemperatureRequest, TemperatureResponse } from '@/contracts/bench/temperature';
import { asTyped, shown, writtenOut } from '@/domain/engine/derived';
import { type Failure, invalid } from '@/domain/failure';
import { getMaterial } from '@/domain/measurement/material';
import { at20, readBy, temperatureComponents, type Warmth } from '@/domain/measurement/temperature';
import { combine } from '@/domain/measurement/uncertainty';
import { convert, widthIn } from '@/domain/quantity/convert';
import { formatIn } from '@/domain/quantity/format';
import type { Quantity } from '@/domain/quantity/quantity';
import { sub, toNumber } from '@/domain/quantity/rational';
import { fail, ok, type Result } from '@/domain/result';
import { Taker } from './take';

/** A length read warm or cold, brought to 20 °C (ISO 1). */
export function correctTemperature(
  request: TemperatureRequest,
): Result<TemperatureResponse, Failure> {
  const take = new Taker();
  const unit = take.unit('/unit', request.unit, 'length');
  const length = take.size('/length', request.length, 'length', unit);
  const part: Warmth = {
    temperature: take.quantity('/temperature', request.temperature, 'temperature'),
    material: take.material('/material', request.material),
  };
  const { gaugeTemperature } = request;
  const gauge: Warmth | undefined =
    gaugeTemperature === undefined
      ? undefined
      : {
          temperature: take.quantity('/gaugeTemperature', gaugeTemperature, 'temperature'),
          material: getMaterial('steel'),
        };
  if (take.faults.length > 0) return fail(invalid(take.faults));
  const now = gauge === undefined ? length.value : readBy(length.value, gauge);
  const settled = writtenOut('length', at20(now, part), unit);
  const change = writtenOut('length', sub(length.value, settled.value), unit);
  const size = toNumber(now);
  const { standardUncertainty } = combine([
    ...temperatureComponents(size, part, 'the part'),
    ...(gauge === undefined ? [] : temperatureComponents(-size, gauge, 'the gauge')),
  ]);
  return ok({
    unit,
    lengthAt20C: settled.text,
    change: change.text,
    standardUncertainty: widthIn('length', standardUncertainty, unit),
    working: [
      `The part stands at ${degrees(part.temperature)}; ${part.material.name}, ${coefficient(part)} per K.`,
      ...(gauge === undefined
        ? ['The gauge is taken as being at 20 °C.']
        : [
            `The steel gauge stands at ${degrees(gauge.temperature)}: the part is truly ${shown(writtenOut('length', now, unit), 6)} now.`,
          ]),
      `${asTyped({ value: length })} ÷ (1 + α × (T − 20 °C)) = ${shown(settled, 6)} at 20 °C`,
    ],
  });
}

const degrees = (temperature: Quantity<'temperature'>): string =>
  temperature.unit === '°C'
    ? `${formatIn(temperature, '°C', 1)} °C`
    : `${formatIn(temperature, temperature.unit, 1)} ${temperature.unit} (${formatIn(convert(temperature, '°C'), '°C', 1)} °C)`;

const coefficient = ({ material }: Warmth): string =>
  `${(toNumber(material.coefficient) * 1e6).toFixed(1)} ± ${(toNumber(material.halfWidth) * 1e6).toFixed(1)} × 10⁻⁶`;
