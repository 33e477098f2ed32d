import type { GaugeStripProps } from '@/components/look/GaugeStrip';
import { markOfState } from '@/components/look/status';
import type { GaugeRecord } from '@/domain/inspection/capture/gauge-record';
import type { Finding } from '@/domain/inspection/finding';
import { baseNumber, convert, widthIn } from '@/domain/quantity/convert';
import type { Written } from '@/domain/quantity/dimension';
import { asciiIn, formatWidth } from '@/domain/quantity/format';
import { decimalsOf } from '@/domain/quantity/number-text';
import { parseWritten } from '@/domain/quantity/parse';
import { quantityOf } from '@/domain/quantity/quantity';
import type { Clause } from '@/domain/rulebook/clause';
import type { PositionResult } from '@/domain/rulebook/clause-result';
import { decisionOf } from '@/domain/rulebook/evaluate/decision-of';
import { getQuantityEntry } from '@/domain/rulebook/quantity-catalogue';

/** What a strip and a result line show of one position's result, in the unit of the sheet. */
export interface ShownResult {
  readonly value: string;
  /** Rounded for a place on the map; nothing where even that is too long. */
  readonly short?: string | undefined;
  readonly uncertainty: string;
  readonly k: string;
  readonly unit: string;
  readonly strip: GaugeStripProps;
}

type Limit = Extract<NonNullable<Clause['requirement']>, { kind: 'limit' }>;

/** Clearances and differences read in thousandths of an inch; sizes in their own unit. */
export const unitShown = (requirement: Limit): { unit: string; shown: string } => {
  const small = ['tappet-clearance', 'foot-less-body', 'bore-out-of-round', 'bore-taper'];
  return requirement.unit === 'in' && small.includes(requirement.quantity)
    ? { unit: 'thou', shown: '0.001 in' }
    : { unit: requirement.unit, shown: requirement.unit };
};

/**
 * How many places of a result are worth reading: one more than the finest gauge behind it resolves, in
 * the unit of the sheet. Nothing where no gauge says.
 */
export const placesRead = (
  { requirement }: Clause,
  { gauges: ids }: Pick<Finding, 'gauges'>,
  gauges: readonly Pick<GaugeRecord, 'id' | 'division'>[],
  inUnit?: string,
): number | undefined => {
  if (requirement?.kind !== 'limit') return undefined;
  const { dimension } = getQuantityEntry(requirement.quantity);
  const unit = inUnit ?? unitShown(requirement).unit;
  const resolved = gauges.flatMap(({ id, division }) => {
    const read = ids.includes(id) && division ? parseWritten(division, dimension) : undefined;
    return read?.ok === true ? [decimalsOf(convert(read.value, unit).text)] : [];
  });
  return resolved.length === 0 ? undefined : Math.max(...resolved) + 1;
};

/**
 * The numbers of a result against its clause; nothing where the position has none. A mean is rounded,
 * half to even, to `most` places; in full it stands in the finding's `exact`.
 */
export const shownResult = (
  clause: Clause,
  result: PositionResult,
  most = Number.POSITIVE_INFINITY,
): ShownResult | undefined => {
  const { requirement } = clause;
  if (requirement?.kind !== 'limit' || result.value === undefined) return undefined;
  const { dimension } = getQuantityEntry(requirement.quantity);
  const { unit, shown } = unitShown(requirement);
  const steps = (base: number) => widthIn(dimension, base, unit);
  const read = (written: Written) => {
    const quantity = parseWritten(written, dimension);
    if (!quantity.ok) throw new RangeError(quantity.failure.detail);
    return quantity.value;
  };
  const number = (written: Written) => steps(baseNumber(read(written)));
  const exact = read(result.exact ?? result.value);
  const places = Math.min(most, decimalsOf(convert(read(result.value), unit).text));
  const value = asciiIn(exact, unit, unit === 'thou' ? Math.max(places, 2) : places);
  const { limits } = decisionOf(requirement);
  const bound = (limit: typeof limits.max, word: string) =>
    limit && {
      value: steps(baseNumber(limit)),
      label: `${asciiIn(limit, unit, decimalsOf(convert(quantityOf(dimension, limit.value, limit.unit), unit).text))} ${word}`,
    };
  const uncertainty = result.uncertainty ? number(result.uncertainty) : 0;
  const guarded = result.guardBand;
  return {
    value,
    ...(unit === 'thou'
      ? { short: asciiIn(exact, unit, 1) }
      : value.length <= 4
        ? { short: value }
        : {}),
    uncertainty: result.uncertainty
      ? formatWidth(
          dimension,
          baseNumber(read(result.uncertainty)),
          unit,
          unit === 'thou' ? 2 : places,
        )
      : '0',
    k: result.coverageFactor ?? '2',
    unit: shown,
    strip: {
      min: bound(limits.min, 'min'),
      max: bound(limits.max, 'max'),
      reading: { value: number({ text: exact.text, unit: exact.unit }), label: value },
      uncertainty,
      unit: shown,
      status: markOfState(result.state),
      ...(guarded === undefined
        ? {}
        : {
            guard: {
              kind:
                requirement.decisionRule.kind === 'guarded-rejection' ? 'rejection' : 'acceptance',
              width: number(guarded),
            } as const,
          }),
    },
  };
};

/** A result's value in the unit of its rule, rounded half to even to what its gauges resolve and one place more. */
export const valueRead = (
  clause: Clause,
  finding: Finding,
  { value, exact }: PositionResult,
  gauges: readonly Pick<GaugeRecord, 'id' | 'division'>[],
): Written | undefined => {
  const { requirement } = clause;
  if (value === undefined || requirement?.kind !== 'limit') return value;
  const most = placesRead(clause, finding, gauges, value.unit);
  if (most === undefined || decimalsOf(value.text) <= most) return value;
  const read = parseWritten(exact ?? value, getQuantityEntry(requirement.quantity).dimension);
  return read.ok ? { text: asciiIn(read.value, value.unit, most), unit: value.unit } : value;
};

export const resultAt = (
  findings: readonly Finding[],
  clause: string | undefined,
  position: string,
): PositionResult | undefined =>
  findings
    .find((finding) => finding.clause === clause)
    ?.perPosition.find((result) => result.position === position);

/** "0.10 under the max; U is 0.15." Where a value stands against its nearer limit, in short. */
export const nearWords = ({ strip, uncertainty, value }: ShownResult): string => {
  const reading = strip.reading?.value ?? Number(value);
  const places = Math.max(2, uncertainty.split('.')[1]?.length ?? 0);
  const sides = [
    strip.max && { off: strip.max.value - reading, inside: 'under the max', past: 'over the max' },
    strip.min && { off: reading - strip.min.value, inside: 'over the min', past: 'under the min' },
  ].filter((side) => side !== undefined);
  const [near] = sides.sort((a, b) => a.off - b.off);
  if (near === undefined) return '';
  const off = Math.abs(near.off).toFixed(places);
  return `${off} ${near.off < 0 ? near.past : near.inside}; U is ${uncertainty}.`;
};
