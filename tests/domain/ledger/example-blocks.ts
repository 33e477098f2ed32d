import { runDraw } from '@/domain/draw/make-draw';
import { commitmentHash } from '@/domain/draw/seed';
import { sha256, toHex, utf8 } from '@/domain/ledger/bytes';
import { canonicalJson } from '@/domain/ledger/canonical';
import { chainHead } from '@/domain/ledger/chain';
import { commit } from '@/domain/ledger/commitment';
import { encodeFrontier } from '@/domain/ledger/frontier-bytes';
import { lineLeaf } from '@/domain/ledger/line';
import { frontierOf } from '@/domain/ledger/tree';
import {
  example,
  extensionOf,
  headAt,
  KEY,
  lines,
  noticeFile,
  pdf,
  pdfFile,
  proofOf,
  saltOf,
  seedOf,
  signer,
  text,
  tree,
} from './example';

const table = (rows: Readonly<Record<string, string>>): string =>
  Object.entries(rows)
    .map(([key, value]) => `${key} = ${value}`)
    .join('\n');

/** Every worked value of docs/record-format.md, by the name of its block, made by the code. */
export const exampleBlocks = async (): Promise<ReadonlyMap<string, string>> => {
  const { inspection, batches, drawCommitment, drawSecret, made } = example;
  const run = runDraw(drawCommitment, drawSecret, made.values);
  const heads = batches.map((_, i) => toHex(chainHead(inspection, batches.slice(0, i + 1))));
  const inclusion = await proofOf(4, 5);
  const extension = await extensionOf(5, 7);
  return new Map([
    ['document', text.notice],
    [
      'commitment',
      table({
        salt: saltOf('notice'),
        'content hash': toHex(sha256(utf8(text.notice))),
        commitment: toHex(commit(seedOf('salt of notice'), utf8(text.notice))),
      }),
    ],
    ['lines', lines.join('\n')],
    [
      'leaf hashes',
      table(Object.fromEntries(lines.map((line, i) => [`line ${i}`, toHex(lineLeaf(line))]))),
    ],
    [
      'roots',
      table(Object.fromEntries(lines.map((_, i) => [`size ${i + 1}`, toHex(tree.root(i + 1))]))),
    ],
    ['frontier', toHex(encodeFrontier(frontierOf(tree.leaves.slice(0, 7))))],
    ['inclusion', inclusion.path.join('\n')],
    ['consistency', extension.path.join('\n')],
    [
      'key',
      table({
        'private seed': toHex(seedOf('key')),
        'public key': toHex(signer.key.publicKey),
        'key id': signer.key.id,
        'verifier key': KEY,
      }),
    ],
    ['checkpoint', (await headAt(5)).trimEnd()],
    ['newer checkpoint', (await headAt(7)).trimEnd()],
    [
      'checkpoint with its time',
      (await headAt(7, [signer], { signedAt: '2027-05-01T16:00:03.250Z' })).trimEnd(),
    ],
    [
      'hand-over',
      canonicalJson({
        document: text.key,
        salt: saltOf('key'),
        proof: { ...(await proofOf(6, 7)) },
      }),
    ],
    [
      'chain',
      table({
        inspection,
        'batch 1': canonicalJson(batches[0]),
        'batch 2': canonicalJson(batches[1]),
        h0: toHex(chainHead(inspection, [])),
        h1: heads[0] ?? '',
        h2: heads[1] ?? '',
      }),
    ],
    ['notice file', await noticeFile()],
    ['pdf', new TextDecoder().decode(pdf).trimEnd()],
    ['pdf file', await pdfFile()],
    ['draw-commitment', text.drawCommitment],
    ['draw-made', text.drawMade],
    [
      'draw seed',
      table({
        secret: toHex(drawSecret),
        'commitment hash': toHex(commitmentHash(drawCommitment)),
        'values text': run.values,
        seed: toHex(run.seed),
      }),
    ],
    [
      'draw rounds',
      run.rounds
        .map(
          ({ round, digest, left, remainder, chosen }) =>
            `round ${round}: digest ${toHex(digest)}, ${left} left, remainder ${remainder}, number ${chosen}, car ${run.selected[round]?.car}`,
        )
        .join('\n'),
    ],
  ]);
};
