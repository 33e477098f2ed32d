import * as z from 'zod/mini';
import { findHex } from '../bytes';

const HASH = z.string().check(z.regex(/^[0-9a-f]{64}$/));
const path = z.array(HASH).check(z.maxLength(64));

/** A line, its inclusion path in hex, and the signed head that the path leads to. */
export const lineProofShape = z.strictObject({
  line: z.string().check(z.maxLength(100_000)),
  path,
  checkpoint: z.string().check(z.maxLength(100_000)),
});

export type LineProof = z.infer<typeof lineProofShape>;

/** A newer signed head and the consistency path from the older one. */
export const extensionShape = z.strictObject({
  path,
  checkpoint: z.string().check(z.maxLength(100_000)),
});

export type Extension = z.infer<typeof extensionShape>;

/** Hex texts of a shape checked before. */
export const hashesOf = (hexes: readonly string[]): readonly Uint8Array[] =>
  hexes.map((hex) => findHex(hex, 32) ?? new Uint8Array());
