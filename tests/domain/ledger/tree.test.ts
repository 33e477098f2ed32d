import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { utf8 } from '@/domain/ledger/bytes';
import { decodeFrontier, encodeFrontier } from '@/domain/ledger/frontier-bytes';
import { fillPlan, planConsistency, planInclusion, planRoot } from '@/domain/ledger/proof';
import {
  appendLeaf,
  EMPTY,
  foldSubtrees,
  frontierOf,
  hashLeaf,
  hashNode,
  rootOf,
} from '@/domain/ledger/tree';
import { verifyConsistency, verifyInclusion } from '@/domain/ledger/verify-proof';
import { checkValue, hex, unhex } from './check-value';
import { flipped, grow, rootByDefinition } from './grown-tree';

const vectors = checkValue<{ leaves_hex: string[] }, { roots: string[] }>('merkle-roots-0..8');
const published = vectors.inputs.leaves_hex.map((leaf) => hashLeaf(unhex(leaf)));

describe('the Merkle tree of RFC 9162', () => {
  it('gives the published roots of 0 to 8 leaves', () => {
    const roots = vectors.expected.roots.map((_, n) =>
      hex(rootOf(frontierOf(published.slice(0, n)))),
    );
    expect(roots).toEqual(vectors.expected.roots);
  });

  it('gives the published leaf hashes', () => {
    const { expected } = checkValue<never, { leaf_hashes: string[] }>('merkle-leaf-hashes');
    expect(published.map(hex)).toEqual(expected.leaf_hashes);
  });

  it('gives the published hashes of a leaf and a node', () => {
    const { inputs, expected } = checkValue<
      { leaf_ascii: string; node_ascii: [string, string] },
      { leaf: string; node: string }
    >('merkle-hasher');
    expect(hex(hashLeaf(utf8(inputs.leaf_ascii)))).toBe(expected.leaf);
    expect(hex(hashNode(utf8(inputs.node_ascii[0]), utf8(inputs.node_ascii[1])))).toBe(
      expected.node,
    );
  });

  it('gives the root of the recursive definition for any number of leaves', () => {
    for (let n = 1; n <= 130; n++) {
      const tree = grow(n);
      expect(hex(tree.root(n))).toBe(hex(rootByDefinition(tree.leaves)));
    }
  });

  it('appends by touching no more nodes than the logarithm of the size', () => {
    let frontier = EMPTY;
    let most = 0;
    for (let n = 0; n < 5000; n++) {
      const appended = appendLeaf(frontier, hashLeaf(utf8(String(n))));
      frontier = appended.frontier;
      most = Math.max(most, appended.nodes.length);
      expect(appended.nodes.length).toBeLessThanOrEqual(Math.floor(Math.log2(n + 1)) + 1);
    }
    expect(most).toBe(13);
  });
});

describe('the stored frontier', () => {
  it('comes back from its bytes, and appending goes on from there', () => {
    for (const n of [0, 1, 2, 7, 8, 100]) {
      const tree = grow(n + 1);
      const decoded = decodeFrontier(encodeFrontier(frontierOf(tree.leaves.slice(0, n))));
      expect(decoded.ok).toBe(true);
      if (!decoded.ok) continue;
      const next = appendLeaf(decoded.value, tree.leaves[n]!).frontier;
      expect(hex(rootOf(next))).toBe(hex(tree.root(n + 1)));
    }
  });

  it('is refused when its length does not fit its size', () => {
    const bytes = encodeFrontier(grow(5).frontier);
    expect(decodeFrontier(bytes.slice(0, -1)).ok).toBe(false);
    expect(decodeFrontier(bytes.slice(0, -32)).ok).toBe(false);
    expect(decodeFrontier(bytes.slice(0, 7)).ok).toBe(false);
    expect(decodeFrontier(Uint8Array.from({ length: 8 }, () => 255)).ok).toBe(false);
    expect(decodeFrontier(Uint8Array.from({ length: 40 }, () => 255)).ok).toBe(false);
  });
});

describe('inclusion', () => {
  it('gives the published proofs', () => {
    const { inputs, expected } = checkValue<{ cases: [number, number][] }, { proofs: string[][] }>(
      'merkle-inclusion',
    );
    const tree = grow(8, published);
    const proofs = inputs.cases.map(([index, size]) =>
      fillPlan(planInclusion(index, size), tree.read).map(hex),
    );
    expect(proofs).toEqual(expected.proofs);
  });

  it('verifies for every leaf of every tree, in no more steps than the height', () => {
    const tree = grow(70);
    for (let size = 1; size <= 70; size++) {
      for (let index = 0; index < size; index++) {
        const plan = planInclusion(index, size);
        const path = fillPlan(plan, tree.read);
        const claim = { leafHash: tree.leaves[index]!, index, size, path, root: tree.root(size) };
        expect(verifyInclusion(claim)).toBe(true);
        expect(path.length).toBeLessThanOrEqual(Math.ceil(Math.log2(size)));
        expect(plan.flat().length).toBeLessThanOrEqual(2 * Math.ceil(Math.log2(size)));
      }
    }
  });

  it('refuses a proof with any bit of any element flipped', () => {
    const { inputs, expected } = checkValue<{ cases: [number, number][] }, { proofs: string[][] }>(
      'merkle-inclusion',
    );
    for (const [i, [index, size]] of inputs.cases.entries()) {
      const path = expected.proofs[i]!.map(unhex);
      const root = unhex(vectors.expected.roots[size]!);
      const claim = { leafHash: published[index]!, index, size, path, root };
      expect(verifyInclusion(claim)).toBe(true);
      for (let bit = 0; bit < 256; bit++) {
        for (const at of path.keys()) {
          expect(verifyInclusion({ ...claim, path: path.with(at, flipped(path[at]!, bit)) })).toBe(
            false,
          );
        }
        expect(verifyInclusion({ ...claim, root: flipped(root, bit) })).toBe(false);
        expect(verifyInclusion({ ...claim, leafHash: flipped(claim.leafHash, bit) })).toBe(false);
      }
    }
  });

  it('refuses another index, another size, a longer, shorter or reordered path', () => {
    const tree = grow(64);
    fc.assert(
      fc.property(fc.integer({ min: 2, max: 64 }), fc.nat(), fc.nat(), (size, a, b) => {
        const index = a % size;
        const other = b % size;
        const path = fillPlan(planInclusion(index, size), tree.read);
        const claim = { leafHash: tree.leaves[index]!, index, size, path, root: tree.root(size) };
        expect(verifyInclusion({ ...claim, index: other })).toBe(other === index);
        expect(verifyInclusion({ ...claim, path: path.slice(1) })).toBe(false);
        expect(verifyInclusion({ ...claim, path: [...path, path[0]!] })).toBe(false);
        expect(verifyInclusion({ ...claim, path: path.toReversed() })).toBe(path.length < 2);
        expect(verifyInclusion({ ...claim, size: index })).toBe(false);
        expect(verifyInclusion({ ...claim, index: -1 })).toBe(false);
        expect(verifyInclusion({ ...claim, index: index + 0.5 })).toBe(false);
      }),
    );
  });
});

describe('a proof for a tree of another height', () => {
  it('is refused though its hashes lead to the root', () => {
    const tree = grow(16);
    const path = fillPlan(planInclusion(0, 8), tree.read);
    const claim = { leafHash: tree.leaves[0]!, index: 0, path, root: tree.root(8) };
    expect(verifyInclusion({ ...claim, size: 8 })).toBe(true);
    for (const size of [1, 2, 3, 4, 9, 16, 1000]) {
      expect(verifyInclusion({ ...claim, size }), String(size)).toBe(false);
    }
    const later = fillPlan(planInclusion(4, 8), tree.read);
    const moved = { leafHash: tree.leaves[4]!, index: 0, size: 4, path: later, root: tree.root(8) };
    expect(verifyInclusion(moved)).toBe(false);
    const shrunk = {
      first: { size: 3, root: tree.root(7) },
      second: { size: 4, root: tree.root(8) },
      path: fillPlan(planConsistency(7, 8), tree.read),
    };
    expect(verifyConsistency(shrunk)).toBe(false);
    const nothing = { size: 0, root: tree.root(0) };
    expect(verifyConsistency({ first: nothing, second: nothing, path: [] })).toBe(false);
    const grown = {
      first: { size: 4, root: tree.root(4) },
      path: fillPlan(planConsistency(4, 8), tree.read),
    };
    expect(verifyConsistency({ ...grown, second: { size: 8, root: tree.root(8) } })).toBe(true);
    for (const size of [4, 9, 16, 1000]) {
      const second = { size, root: tree.root(8) };
      expect(verifyConsistency({ ...grown, second }), String(size)).toBe(false);
    }
  });
});

describe('consistency', () => {
  // transparency-dev/merkle testdata/consistency, happy paths: 6 → 8 and 2 → 5.
  it.each([
    [
      6,
      8,
      [
        '0ebc5d3437fbe2db158b9f126a1d118e308181031d0a949f8dededebc558ef6a',
        'ca854ea128ed050b41b35ffc1b87b8eb2bde461e9e3b5596ece6b9d5975a0ae0',
        'd37ee418976dd95753c1c73862b9398fa2a2cf9b4ff0fdfe8b30cd95209614b7',
      ],
    ],
    [
      2,
      5,
      [
        '5f083f0a1a33ca076a95279832580db3e0ef4584bdff1f54c8a360f50de3031e',
        'bc1a0643b12e4d2d7c77918f44e0f4f79a838b6cf9ec5b5c283e1f4d88599e6b',
      ],
    ],
  ] as const)('gives the published proof from %i to %i', (first, second, proof) => {
    expect(fillPlan(planConsistency(first, second), grow(8, published).read).map(hex)).toEqual(
      proof,
    );
  });

  it('verifies between every two sizes and refuses every flipped bit', () => {
    const tree = grow(40);
    for (let n = 1; n <= 40; n++) {
      for (let m = 1; m <= n; m++) {
        const path = fillPlan(planConsistency(m, n), tree.read);
        const claim = {
          first: { size: m, root: tree.root(m) },
          second: { size: n, root: tree.root(n) },
          path,
        };
        expect(verifyConsistency(claim)).toBe(true);
        const bit = (m * 7 + n * 13) % 256;
        for (const at of path.keys()) {
          expect(
            verifyConsistency({ ...claim, path: path.with(at, flipped(path[at]!, bit)) }),
          ).toBe(false);
        }
        expect(verifyConsistency({ ...claim, path: [...path, tree.root(1)] })).toBe(false);
        if (path.length > 0)
          expect(verifyConsistency({ ...claim, path: path.slice(0, -1) })).toBe(false);
        for (const side of ['first', 'second'] as const) {
          const bad = { ...claim[side], root: flipped(claim[side].root, bit) };
          expect(verifyConsistency({ ...claim, [side]: bad })).toBe(false);
        }
      }
    }
  });

  it('refuses a history that was rewritten, shortened or reordered', () => {
    const honest = grow(40);
    fc.assert(
      fc.property(fc.integer({ min: 2, max: 39 }), fc.nat(), (m, a) => {
        const changed = honest.leaves.with(a % m, hashLeaf(utf8('another line')));
        const forged = grow(40, changed);
        const claim = {
          first: { size: m, root: honest.root(m) },
          second: { size: 40, root: forged.root(40) },
          path: fillPlan(planConsistency(m, 40), forged.read),
        };
        expect(verifyConsistency(claim)).toBe(false);
        expect(verifyConsistency({ ...claim, first: claim.second, second: claim.first })).toBe(
          false,
        );
      }),
    );
  });

  it('reads few nodes and folds the root from them', () => {
    const tree = grow(1000);
    expect(planRoot(1000).length).toBe(6);
    expect(hex(foldSubtrees(planRoot(1000).map(tree.read)))).toBe(hex(tree.root(1000)));
    expect(planConsistency(700, 1000).flat().length).toBeLessThanOrEqual(20);
  });

  it('has no plan for what does not exist', () => {
    expect(() => planInclusion(5, 5)).toThrow(RangeError);
    expect(() => planConsistency(0, 5)).toThrow(RangeError);
    expect(() => planConsistency(6, 5)).toThrow(RangeError);
  });
});
