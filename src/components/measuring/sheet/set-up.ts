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
  /** What reads everything else, unless a gauge was chosen for it. */
  readonly otherGaugeId: string;
  /** A gauge chosen for one quantity, by its name. */
  readonly gaugeIds: Readonly<Record<string, string>>;
  /** Places that are read in full though the plan asks one reading: `tappet-bore-diameter 5 intake`. */
  readonly fullAt: readonly string[];
  /** Whether advisory clauses are read for too. */
  readonly advice: boolean;
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
      kinds.includes(gauge.kind) &&
      (gauge.division === undefined || parseWritten(gauge.division, 'length').ok) &&
      (size === undefined || reaches(gaugeOf(gauge, 'length'), size)),
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
    form: 'plan',
    method: boreGaugeId === '' ? 'absolute' : 'comparative',
    zeroedOn: ringId === '' ? 'lifter' : 'ring',
    micrometerId: firstOf(gauges, ['micrometer', 'caliper'], today, LIFTER),
    boreGaugeId,
    ringId,
    otherGaugeId: firstOf(gauges, ['other', 'micrometer', 'caliper'], today, CYLINDER),
    gaugeIds: {},
    fullAt: [],
    advice: false,
    temperatures: {},
    hand: 'right',
  };
};

const isBore = (quantity: QuantityName) => quantity === 'tappet-bore-diameter';

export const isComparative = (setUp: SetUp, quantity: QuantityName): boolean =>
  isBore(quantity) && setUp.method === 'comparative';

/** Sizes about which a quantity is usually found; a gauge that reaches them is taken first. Common practice. */
const USUAL: Partial<Record<QuantityName, string>> = {
  'cylinder-bore': '4',
  stroke: '3.5',
  'valve-lift': '0.45',
  'lobe-lift': '0.3',
  'valve-head-diameter': '2',
  'deck-clearance': '0.02',
  'gasket-bore': '4.1',
  'gasket-thickness': '0.04',
};

/** Gauges that can read a quantity at all, by their kind and the unit of their division. */
export const gaugesFor = (
  quantity: QuantityName,
  gauges: readonly SheetGauge[],
): readonly SheetGauge[] => {
  const { dimension } = getQuantityEntry(quantity);
  return gauges.filter(({ kind, division }) => {
    if (kind === 'setting-ring' || kind === 'plug-gauge') return false;
    if (dimension === 'mass') return kind === 'scale';
    if (kind === 'scale') return false;
    return division === undefined || parseWritten(division, dimension).ok;
  });
};

/** The gauge that reads a quantity: the one chosen for it, else the usual one that reaches it. */
export const gaugeFor = (
  setUp: SetUp,
  quantity: QuantityName,
  gauges: readonly SheetGauge[],
): SheetGauge | undefined => {
  const find = (id: string | undefined) => gauges.find((gauge) => gauge.id === id);
  const chosen = find(setUp.gaugeIds[quantity]);
  if (chosen !== undefined) return chosen;
  if (isBore(quantity)) return find(setUp.boreGaugeId);
  if (quantity === 'lifter-body-diameter' || quantity === 'foot-diameter')
    return find(setUp.micrometerId);
  const able = gaugesFor(quantity, gauges).filter(({ withdrawn }) => withdrawn !== true);
  const usual = USUAL[quantity];
  const size = usual && fromStored({ text: usual, unit: 'in' }, 'length');
  const other = able.find(({ id }) => id === setUp.otherGaugeId);
  const fits = (gauge: SheetGauge | undefined) =>
    gauge !== undefined && (!size || reaches(gaugeOf(gauge, 'length'), size));
  return fits(other) ? other : (able.find(fits) ?? other ?? able[0]);
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
