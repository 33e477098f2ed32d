import { type Guard, guardBands, stripScale } from '@/domain/decision/strip-scale';
import { paint } from './paint';
import { displayNumber } from './ReadingValue';
import { type Status, statusWord } from './status';
import { labelWidth, measures, NARROWEST, type StripSize } from './strip/measures';
import { Hatch, Label, type Labelled, Limit, Line, Reading } from './strip/parts';

export interface GaugeStripProps {
  readonly min?: Labelled | undefined;
  readonly max?: Labelled | undefined;
  readonly reading?: Labelled | undefined;
  /** Expanded uncertainty U, in the same unit as the values. */
  readonly uncertainty?: number | undefined;
  readonly guard?: Guard | undefined;
  readonly unit: string;
  readonly size?: StripSize;
  readonly status?: Status | undefined;
  /** The word over each forbidden bar. */
  readonly outsideWord?: string;
  /** True only where the reading has just come in. */
  readonly settle?: boolean;
}

const sentence = (props: GaugeStripProps): string => {
  const { reading, uncertainty, min, max, unit, status } = props;
  const parts = [
    reading === undefined ? 'no reading' : `reading ${displayNumber(reading.label)}`,
    ...(reading !== undefined && uncertainty
      ? [`uncertainty ${Number(uncertainty.toPrecision(3))}`]
      : []),
    ...(min === undefined ? [] : [min.label]),
    ...(max === undefined ? [] : [max.label]),
  ];
  const word = status === undefined ? '' : `: ${statusWord[status]}`;
  return `${parts.join(', ')}, in ${unit}${word}`;
};

/**
 * A reading against its limits. It fills its column, draws without script, and never replaces the
 * number, which stands beside it. Values are plain numbers for placing ink; nothing is decided here.
 */
export const GaugeStrip = (props: GaugeStripProps) => {
  const { min, max, reading, uncertainty = 0, guard } = props;
  const { size = 'measuring', outsideWord = 'outside', settle = false } = props;
  const m = measures[size];
  const isPrint = size === 'print';
  const values = { min: min?.value, max: max?.value, reading: reading?.value, uncertainty, guard };
  const scale = stripScale(values);
  const clear = (a: Labelled | undefined, b: Labelled | undefined) =>
    a === undefined ||
    b === undefined ||
    (Math.abs(scale.at(a.value) - scale.at(b.value)) / 100) * NARROWEST >
      (labelWidth(a.label, m) + labelWidth(b.label, m)) / 2 + 8;
  const limitsClear = clear(min, max);
  const common = { m, scale };
  return (
    <svg
      className={`strip strip-${size}`}
      width="100%"
      height={m.height}
      overflow="visible"
      role="img"
      aria-label={sentence(props)}
    >
      {guardBands(values).map((band) => (
        <Hatch key={band.join()} {...common} band={band} tinted={!isPrint} />
      ))}
      <Line {...common} tick={isPrint ? paint.ink : paint.edge} />
      {min !== undefined && (
        <Limit {...common} side="min" limit={min} word={outsideWord} labelled={limitsClear} />
      )}
      {max !== undefined && (
        <Limit {...common} side="max" limit={max} word={outsideWord} labelled={limitsClear} />
      )}
      {!limitsClear && m.font > 0 && min !== undefined && max !== undefined && (
        <Label
          m={m}
          place={(scale.at(min.value) + scale.at(max.value)) / 2}
          label={`${min.label}, ${max.label}`}
        />
      )}
      {reading !== undefined && (
        <Reading
          {...common}
          reading={reading}
          uncertainty={uncertainty}
          ink={isPrint ? paint.ink : paint.marking}
          labelled={isPrint && clear(reading, min) && clear(reading, max)}
          settle={settle}
        />
      )}
    </svg>
  );
};
