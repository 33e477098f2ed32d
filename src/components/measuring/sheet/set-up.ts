import { gaugeOf } from '@/domain/inspection/capture/gauge-record';
import type { LoggedTemperatures } from '@/domain/inspection/capture/rows';
import { reaches } from '@/domain/measurement/gauge';
import { convert } from '@/domain/quantity/convert';
import type { Written } from '@/domain/quantity/dimension';
import { decimalsOf } from '@/domain/quantity/number-text';
import { parseWritten } from '@/domain/quantity/parse';
import type { Quantity } from '@/domain/quantity/quantity';
import { fromStored } from '@/domain/quantity/stored';
import { getQuantityEntry, type QuantityName } from '@/domain/rulebook/quantity-catalogue';
import type { Form } from './parts';
import type { SheetGauge } from './sheet';

/** How this sheet is taken: chosen once, kept on the device. */
export interface SetUp {
  readonly form: Form;
  readonly method: 'comparative' | 'absolute';
  readonly zeroedOn: 'ring' | 'lifter';
  readonly micrometerId: string;
  readonly boreGaugeId: string;
  readonly ringId: string;
  /** What reads everything else. */
  readonly otherGaugeId: string;
  readonly temperatures: LoggedTemperatures;
  readonly hand: 'right' | 'left';
}

// Common practice: the smallest lifters and their bores, and a cylinder's bore.
const LIFTER = fromStored({ text: '0.842', unit: 'in' }, 'length');
const CYLINDER = fromStored({ text: '4', unit: 'in' }, 'length');

/** The first gauge of a kind that reaches the size, is in use and not overdue; else one that reaches it; else none. */
const firstOf = (
  gauges: readonly SheetGauge[],
  kinds: readonly string[],
  today: string,
  size?: Quantity<'length'>,
): string => {
  const alike = gauges.filter(
    (gauge) =>
      kinds.includes(gauge.kind) && (size === undefined || reaches(gaugeOf(gauge, 'length'), size)),
  );
  const good = alike.find(
    (gauge) =>
      gauge.withdrawn !== true &&
      gauge.calibratedOn !== undefined &&
      (gauge.dueOn === undefined || gauge.dueOn >= today),
  );
  return good?.id ?? alike[0]?.id ?? '';
};

export const usualSetUp = (gauges: readonly SheetGauge[], today: string): SetUp => {
  const ringId = firstOf(gauges, ['setting-ring'], today);
  const boreGaugeId = firstOf(gauges, ['dial-bore-gauge', 'telescoping-gauge'], today, LIFTER);
  return {
    form: 'full',
    method: boreGaugeId === '' ? 'absolute' : 'comparative',
    zeroedOn: ringId === '' ? 'lifter' : 'ring',
    micrometerId: firstOf(gauges, ['micrometer', 'caliper'], today, LIFTER),
    boreGaugeId,
    ringId,
    otherGaugeId: firstOf(gauges, ['other', 'micrometer', 'caliper'], today, CYLINDER),
    temperatures: {},
    hand: 'right',
  };
};

const isBore = (quantity: QuantityName) => quantity === 'tappet-bore-diameter';

export const isComparative = (setUp: SetUp, quantity: QuantityName): boolean =>
  isBore(quantity) && setUp.method === 'comparative';

export const gaugeFor = (
  setUp: SetUp,
  quantity: QuantityName,
  gauges: readonly SheetGauge[],
): SheetGauge | undefined => {
  const { dimension } = getQuantityEntry(quantity);
  const id = isBore(quantity)
    ? setUp.boreGaugeId
    : quantity === 'lifter-body-diameter' || quantity === 'foot-diameter'
      ? setUp.micrometerId
      : setUp.otherGaugeId;
  const chosen = gauges.find((gauge) => gauge.id === id);
  return dimension === 'mass' ? (gauges.find((gauge) => gauge.kind === 'scale') ?? chosen) : chosen;
};

/** Unit and decimals in which a quantity is typed: what the gauge's division resolves. */
export interface Scale {
  readonly unit: string;
  /** As it stands over the keys: "0.001 in". */
  readonly shown: string;
  readonly decimals: number;
}

export const scaleFor = (
  setUp: SetUp,
  quantity: QuantityName,
  gauge: SheetGauge | undefined,
): Scale => {
  const entry = getQuantityEntry(quantity);
  const metric = gauge?.division?.unit === 'mm' || gauge?.division?.unit === 'µm';
  const comparative = isComparative(setUp, quantity);
  const unit =
    entry.dimension === 'length'
      ? comparative
        ? metric
          ? 'µm'
          : 'thou'
        : metric
          ? 'mm'
          : 'in'
      : entry.unit;
  const division: Written | undefined = gauge?.division;
  const read = division && parseWritten(division, entry.dimension);
  const usual = comparative ? 1 : entry.dimension === 'length' ? 4 : 1;
  const decimals = read?.ok === true ? decimalsOf(convert(read.value, unit).text) : usual;
  return { unit, shown: unit === 'thou' ? '0.001 in' : unit, decimals };
};
