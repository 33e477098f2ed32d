const digitsOf = (currency: string): number =>
  new Intl.NumberFormat('en', { style: 'currency', currency }).resolvedOptions()
    .maximumFractionDigits ?? 2;

/** A sum in the currency's smallest unit as a number: `250`, `12.50`. */
export const moneyText = (minor: string, currency: string): string => {
  const digits = digitsOf(currency);
  const padded = minor.padStart(digits + 1, '0');
  const cut = padded.length - digits;
  const part = padded.slice(cut);
  return `${padded.slice(0, cut)}${/^0*$/.test(part) ? '' : `.${part}`}`;
};

/** `250 USD`, `12.50 USD` */
export const moneyWords = (money: { readonly minor: string; readonly currency: string }): string =>
  `${moneyText(money.minor, money.currency)} ${money.currency}`;

/** `250`, `12.50` or `12,50` in the currency's smallest unit; nothing for what is no sum of it. */
export const findMinor = (text: string, currency: string): number | undefined => {
  const read = /^(\d{1,9})(?:[.,](\d+))?$/.exec(text.trim());
  if (read === null) return undefined;
  const [, whole = '', part = ''] = read;
  const digits = digitsOf(currency);
  return part.length > digits ? undefined : Number(`${whole}${part.padEnd(digits, '0')}`);
};
