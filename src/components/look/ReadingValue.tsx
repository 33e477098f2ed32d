interface ReadingValueProps {
  /** As written, trailing zeros and all; a hyphen or minus sign becomes U+2212. */
  readonly value: string;
  readonly unit?: string;
  /** Expanded uncertainty U. Never shown without its `k`. */
  readonly uncertainty?: { readonly value: string; readonly k: string };
  readonly large?: boolean;
  /** Show plus signs: differences from zero carry one. */
  readonly signed?: boolean;
}

/** A number for display: real minus, and a plus where a signed value is asked for. */
export const displayNumber = (text: string, signed = false): string => {
  const plain = text.trim().replace(/^[-\u2212]/, '\u2212');
  const isZero = /^[+\u2212]?[0.,]*$/.test(plain);
  if (signed && !isZero && !/^[+\u2212]/.test(plain)) return `+${plain}`;
  return plain;
};

const spoken = (text: string) => text.replace('\u2212', 'minus ').replace(/^\+/, 'plus ');

/** `0.0062 in ± 0.0002 in (k = 2)`. */
export const ReadingValue = ({
  value,
  unit,
  uncertainty,
  large = false,
  signed = false,
}: ReadingValueProps) => {
  const shown = displayNumber(value, signed);
  const withUnit = (text: string) => (unit === undefined ? text : `${text} ${unit}`);
  const aloud =
    withUnit(spoken(shown)) +
    (uncertainty === undefined
      ? ''
      : `, plus or minus ${withUnit(uncertainty.value)}, k ${uncertainty.k}`);
  return (
    <span className={large ? 'reading reading-lg' : 'reading'}>
      <span className="visually-hidden">{aloud}</span>
      <b aria-hidden="true">
        {withUnit(shown)}
        {uncertainty !== undefined && ` ± ${withUnit(uncertainty.value)}`}
      </b>
      {uncertainty !== undefined && (
        <span className="reading-k" aria-hidden="true">
          {` (k = ${uncertainty.k})`}
        </span>
      )}
    </span>
  );
};
