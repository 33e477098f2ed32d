import { sha256, toHex, utf8 } from '@/domain/ledger/bytes';
import type { Random } from '../ports';

/** A bearer token of 256 bits; only its hash is kept. */
export const newToken = (random: Random): string => toHex(random.bytes(32));

export const tokenHash = (token: string): Buffer => Buffer.from(sha256(utf8(token)));
