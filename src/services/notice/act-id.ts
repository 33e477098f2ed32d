import { sha256, toHex, utf8 } from '@/domain/ledger/bytes';

/** An act's id that follows from what it does: a UUID of version 8 (RFC 9562), the same at every retry. */
export const actIdFor = (purpose: string, id: string): string => {
  const hex = toHex(sha256(utf8(`tagwire/act/${purpose}/${id}`)));
  const variant = ((Number.parseInt(hex.slice(16, 17), 16) & 0b0011) | 0b1000).toString(16);
  return [
    hex.slice(0, 8),
    hex.slice(8, 12),
    `8${hex.slice(13, 16)}`,
    `${variant}${hex.slice(17, 20)}`,
    hex.slice(20, 32),
  ].join('-');
};
