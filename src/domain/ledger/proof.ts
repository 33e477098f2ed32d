import { foldSubtrees, type NodeAt } from './tree';

/** Leaves [from, to). */
interface Range {
  readonly from: number;
  readonly to: number;
}

/**
 * A proof before its hashes are read: one entry an element, each the perfect subtrees that make
 * it, largest first. All entries together are O(log size) nodes, to be fetched in one query.
 */
export type ProofPlan = readonly (readonly NodeAt[])[];

/** RFC 9162 section 2.1.3.1: PATH(index, D[size]). */
export const planInclusion = (index: number, size: number): ProofPlan => {
  if (!(index >= 0 && index < size)) throw new RangeError(`No leaf ${index} in a tree of ${size}.`);
  return pathOf(index, { from: 0, to: size }).map(subtreesOf);
};

/** RFC 9162 section 2.1.4.1: PROOF(first, D[second]), for 0 < first ≤ second. */
export const planConsistency = (first: number, second: number): ProofPlan => {
  if (!(first > 0 && first <= second)) {
    throw new RangeError(`No proof leads from ${first} to ${second} leaves.`);
  }
  return subproofOf(first, { from: 0, to: second }, true).map(subtreesOf);
};

/** The nodes whose fold is the root at `size`. */
export const planRoot = (size: number): readonly NodeAt[] => subtreesOf({ from: 0, to: size });

/** Turns a plan into the proof, given what reads one stored node. */
export const fillPlan = (
  plan: ProofPlan,
  read: (node: NodeAt) => Uint8Array,
): readonly Uint8Array[] => plan.map((nodes) => foldSubtrees(nodes.map(read)));

const widthOf = (range: Range): number => range.to - range.from;

/** The largest power of two smaller than `n` (n > 1). */
const splitOf = (n: number): number => {
  let k = 1;
  while (k * 2 < n) k *= 2;
  return k;
};

const pathOf = (index: number, range: Range): readonly Range[] => {
  if (widthOf(range) === 1) return [];
  const middle = range.from + splitOf(widthOf(range));
  const left = { from: range.from, to: middle };
  const right = { from: middle, to: range.to };
  return index < middle ? [...pathOf(index, left), right] : [...pathOf(index, right), left];
};

const subproofOf = (first: number, range: Range, whole: boolean): readonly Range[] => {
  if (first === range.to) return whole ? [] : [range];
  const middle = range.from + splitOf(widthOf(range));
  const left = { from: range.from, to: middle };
  const right = { from: middle, to: range.to };
  return first <= middle
    ? [...subproofOf(first, left, whole), right]
    : [...subproofOf(first, right, false), left];
};

const subtreesOf = (range: Range): readonly NodeAt[] => {
  const nodes: NodeAt[] = [];
  let from = range.from;
  while (from < range.to) {
    let level = 0;
    let width = 1;
    while (from % (width * 2) === 0 && from + width * 2 <= range.to) {
      width *= 2;
      level++;
    }
    nodes.push({ level, index: from / width });
    from += width;
  }
  return nodes;
};
