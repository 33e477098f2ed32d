/** Decimals of the built-in formats that are plain numbers (ECMA-376, 18.8.30). */
const BUILT_IN: Readonly<Record<string, string>> = {
  '1': '0',
  '2': '0.00',
  '3': '#,##0',
  '4': '#,##0.00',
  '9': '0%',
  '10': '0.00%',
};

/** Digits with their decimals, then at most words: `0.0000`, `#,##0.00`, `0.0000" in"`, `0.00%`. */
const PLAIN = /^[#0,]*0(?:\.(0+)(#*))?(%)?\s*(?:\\?\s*"([^"]{0,12})"|((?:\\.)*))?$/;

/** Spreadsheets keep numbers as doubles, 0.844 as 0.84399999999999997: fifteen digits are what was meant. */
export const asMeant = (text: string): string => {
  const number = Number(Number(text).toPrecision(15));
  const plain = String(number);
  return plain.includes('e')
    ? number.toFixed(Math.min(20, 15 - Math.floor(Math.log10(Math.abs(number))))).replace(/0+$/, '')
    : plain;
};

/**
 * A number as the sheet shows it, where that says more than the number: trailing zeros, a unit that
 * stands in the format, a percentage. It is never rounded to what is shown.
 */
export const shownNumber = (text: string, format: string | undefined): string => {
  if (!Number.isFinite(Number(text))) return text;
  const meant = asMeant(text);
  const code = (BUILT_IN[format ?? ''] ?? format ?? '').split(';')[0]?.replace(/\[[^\]]*\]/g, '');
  const [whole, zeros = '', , percent, quoted = '', escaped = ''] = PLAIN.exec(code ?? '') ?? [];
  if (whole === undefined || !/\d/.test(meant)) return meant;
  const number = percent === undefined ? meant : asMeant(String(Number(meant) * 100));
  const decimals = number.split('.')[1] ?? '';
  const missing = zeros.length - decimals.length;
  const point = decimals === '' && zeros !== '' ? '.' : '';
  const padded = missing > 0 ? `${number}${point}${'0'.repeat(missing)}` : number;
  const word = (quoted || escaped.replaceAll('\\', '')).trim();
  return [padded, percent ?? '', word].filter((part) => part !== '').join(' ');
};
