/** What a receipt's code says by itself, without signal: who holds a copy can compare it later. */
export const receiptText = (receipt: {
  readonly series: string;
  /** `Paperwork, version 2` */
  readonly what: string;
  /** Hexadecimal. */
  readonly sha256: string;
  /** The line's number in the series' ledger. */
  readonly line: number;
  /** ISO 8601 in UTC, by the server's clock. */
  readonly at: string;
}): string =>
  [
    'Tagwire receipt',
    receipt.series,
    receipt.what,
    `Ledger line ${receipt.line}`,
    receipt.at,
    `SHA-256 ${receipt.sha256}`,
  ].join('\n');
