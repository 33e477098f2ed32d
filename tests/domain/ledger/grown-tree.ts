import { createHash } from 'node:crypto';
import {
  appendLeaf,
  EMPTY,
  type Frontier,
  hashLeaf,
  type NodeAt,
  rootOf,
} from '@/domain/ledger/tree';

const name = ({ level, index }: NodeAt): string => `${level}/${index}`;

export interface GrownTree {
  readonly leaves: readonly Uint8Array[];
  readonly frontier: Frontier;
  readonly root: (size: number) => Uint8Array;
  readonly read: (node: NodeAt) => Uint8Array;
}

/** A tree grown leaf by leaf, its completed subtrees stored as a database would store them. */
export const grow = (size: number, leaves = someLeaves(size)): GrownTree => {
  const stored = new Map<string, Uint8Array>();
  const roots = [rootOf(EMPTY)];
  let frontier = EMPTY;
  for (const leaf of leaves.slice(0, size)) {
    const appended = appendLeaf(frontier, leaf);
    frontier = appended.frontier;
    for (const node of appended.nodes) stored.set(name(node), node.hash);
    roots.push(rootOf(frontier));
  }
  const get = <T>(found: T | undefined): T => {
    if (found === undefined) throw new Error('No such node was stored.');
    return found;
  };
  return {
    leaves,
    frontier,
    root: (n) => get(roots[n]),
    read: (node) => get(stored.get(name(node))),
  };
};

const someLeaves = (size: number): readonly Uint8Array[] =>
  Array.from({ length: size }, (_, i) => hashLeaf(Uint8Array.of(i % 256, Math.floor(i / 256))));

export const flipped = (bytes: Uint8Array, bit: number): Uint8Array =>
  bytes.with(bit >> 3, bytes[bit >> 3]! ^ (1 << (bit & 7)));

/** MTH of RFC 9162 section 2.1.1, by its recursive definition over leaf hashes. */
export const rootByDefinition = (leaves: readonly Uint8Array[]): Uint8Array => {
  const [first] = leaves;
  if (first !== undefined && leaves.length === 1) return first;
  let k = 1;
  while (k * 2 < leaves.length) k *= 2;
  return createHash('sha256')
    .update(Uint8Array.of(1))
    .update(rootByDefinition(leaves.slice(0, k)))
    .update(rootByDefinition(leaves.slice(k)))
    .digest();
};
