import { sameBytes } from './bytes';
import { hashNode } from './tree';

const half = (n: number): number => Math.floor(n / 2);
const isOdd = (n: number): boolean => n % 2 === 1;
const areHashes = (hashes: readonly Uint8Array[]): boolean =>
  hashes.every((hash) => hash.length === 32);

export interface InclusionClaim {
  readonly leafHash: Uint8Array;
  readonly index: number;
  readonly size: number;
  readonly path: readonly Uint8Array[];
  readonly root: Uint8Array;
}

/** RFC 9162 section 2.1.3.2. */
export const verifyInclusion = ({ leafHash, index, size, path, root }: InclusionClaim): boolean => {
  if (!(Number.isSafeInteger(size) && Number.isSafeInteger(index))) return false;
  if (index < 0 || index >= size || !areHashes([leafHash, root, ...path])) return false;
  let node = index;
  let last = size - 1;
  let hash = leafHash;
  for (const sibling of path) {
    if (last === 0) return false;
    if (isOdd(node) || node === last) {
      hash = hashNode(sibling, hash);
      while (!isOdd(node) && node !== 0) {
        node = half(node);
        last = half(last);
      }
    } else {
      hash = hashNode(hash, sibling);
    }
    node = half(node);
    last = half(last);
  }
  return last === 0 && sameBytes(hash, root);
};

export interface ConsistencyClaim {
  readonly first: { readonly size: number; readonly root: Uint8Array };
  readonly second: { readonly size: number; readonly root: Uint8Array };
  readonly path: readonly Uint8Array[];
}

/** RFC 9162 section 2.1.4.2, for 0 < first ≤ second: the second tree only appends to the first. */
export const verifyConsistency = ({ first, second, path }: ConsistencyClaim): boolean => {
  if (!(Number.isSafeInteger(first.size) && Number.isSafeInteger(second.size))) return false;
  if (first.size < 1 || second.size < first.size) return false;
  if (!areHashes([first.root, second.root, ...path])) return false;
  if (first.size === second.size) return path.length === 0 && sameBytes(first.root, second.root);
  let node = first.size - 1;
  let last = second.size - 1;
  while (isOdd(node)) {
    node = half(node);
    last = half(last);
  }
  // A first tree that is one perfect subtree is its own starting hash and is left out of the proof.
  const [start, ...rest] = node === 0 ? [first.root, ...path] : path;
  if (start === undefined || path.length === 0) return false;
  let older = start;
  let newer = start;
  for (const sibling of rest) {
    if (last === 0) return false;
    if (isOdd(node) || node === last) {
      older = hashNode(sibling, older);
      newer = hashNode(sibling, newer);
      while (!isOdd(node) && node !== 0) {
        node = half(node);
        last = half(last);
      }
    } else {
      newer = hashNode(newer, sibling);
    }
    node = half(node);
    last = half(last);
  }
  return last === 0 && sameBytes(older, first.root) && sameBytes(newer, second.root);
};
