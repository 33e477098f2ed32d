import { bitsNeeded } from './entropy';

/** What a seed of SHA-256 can hold. */
export const SEED_BITS = 256;

/** The pool and the values that are announced. */
interface Announced {
  readonly pool: readonly { readonly number: string; readonly car: string }[];
  readonly select: string;
  readonly values: readonly {
    readonly name: string;
    readonly ifMissing: string;
    readonly substitute: string;
  }[];
}

/** What makes a well-shaped commitment no fair basis for a draw; undefined if nothing. */
export const findCommitmentFault = (commitment: Announced): string | undefined => {
  const { pool, select, values } = commitment;
  if (pool.some(({ number }, i) => number !== String(i + 1))) return 'The pool has a gap.';
  if (new Set(pool.map(({ car }) => car)).size !== pool.length) return 'A car stands twice.';
  if (Number(select) < 1 || Number(select) > pool.length) {
    return 'None is drawn, or more than are in the pool.';
  }
  if (bitsNeeded(pool.length, Number(select)) > SEED_BITS) {
    return 'This pool needs more randomness than one seed holds; divide it.';
  }
  if (new Set(values.map(({ name }) => name)).size !== values.length)
    return 'A value stands twice.';
  return values.some(
    ({ ifMissing, substitute }) => (ifMissing === 'substitute') !== (substitute !== ''),
  )
    ? 'A substitute is named if, and only if, it is to be used.'
    : undefined;
};
