import { concat, sha256 } from './bytes';

/**
 * The Merkle tree of RFC 9162 section 2.1.1, kept as its frontier: the roots of the perfect
 * subtrees that the size's binary digits name, largest first. Appending needs no other node.
 */
export interface Frontier {
  readonly size: number;
  readonly hashes: readonly Uint8Array[];
}

/** The perfect subtree over leaves [index·2^level, (index+1)·2^level). Level 0 is a leaf. */
export interface NodeAt {
  readonly level: number;
  readonly index: number;
}

export interface Node extends NodeAt {
  readonly hash: Uint8Array;
}

const LEAF = Uint8Array.of(0);
const INNER = Uint8Array.of(1);

/** SHA-256(0x00 ‖ data) */
export const hashLeaf = (data: Uint8Array): Uint8Array => sha256(concat(LEAF, data));

/** SHA-256(0x01 ‖ left ‖ right) */
export const hashNode = (left: Uint8Array, right: Uint8Array): Uint8Array =>
  sha256(concat(INNER, left, right));

export const EMPTY: Frontier = { size: 0, hashes: [] };

/**
 * Adds one leaf. `nodes` are the perfect subtrees this leaf completes (itself first), at most
 * log₂(size) + 1 of them: stored by level and index they make every later proof O(log n) reads.
 */
export const appendLeaf = (
  frontier: Frontier,
  leafHash: Uint8Array,
): { readonly frontier: Frontier; readonly nodes: readonly Node[] } => {
  const hashes = [...frontier.hashes];
  const nodes: Node[] = [{ level: 0, index: frontier.size, hash: leafHash }];
  let hash = leafHash;
  let index = frontier.size;
  for (let level = 1; index % 2 === 1; level++) {
    const left = hashes.pop();
    if (left === undefined) throw new RangeError('The frontier does not fit its size.');
    hash = hashNode(left, hash);
    index = (index - 1) / 2;
    nodes.push({ level, index, hash });
  }
  hashes.push(hash);
  return { frontier: { size: frontier.size + 1, hashes }, nodes };
};

/** The root over adjacent subtrees, largest first; of none it is SHA-256 of nothing. */
export const foldSubtrees = (hashes: readonly Uint8Array[]): Uint8Array =>
  hashes.length === 0
    ? sha256(new Uint8Array())
    : hashes.reduceRight((right, left) => hashNode(left, right));

export const rootOf = (frontier: Frontier): Uint8Array => foldSubtrees(frontier.hashes);

export const frontierOf = (leafHashes: Iterable<Uint8Array>): Frontier => {
  let frontier = EMPTY;
  for (const leaf of leafHashes) frontier = appendLeaf(frontier, leaf).frontier;
  return frontier;
};
