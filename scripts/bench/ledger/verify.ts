import { createHash, generateKeyPairSync, sign } from 'node:crypto';
import type { Client } from 'pg';
import { toHex } from '@/domain/ledger/bytes';
import { openCheckpoint, originOf, signCheckpoint } from '@/domain/ledger/checkpoint';
import { lineLeaf } from '@/domain/ledger/line';
import { verifierKey } from '@/domain/ledger/note/verifier-key';
import { fillPlan, planConsistency, planInclusion, planRoot } from '@/domain/ledger/proof';
import { appendLeaf, EMPTY, foldSubtrees, rootOf } from '@/domain/ledger/tree';
import { checkLine } from '@/domain/ledger/verify/check-line';
import { conclude } from '@/domain/ledger/verify/step';
import { verifyConsistency, verifyInclusion } from '@/domain/ledger/verify-proof';
import { type Bench, demand, perSecond, say, timed } from './measure';
import { readNodes } from './nodes';

/** Two hundred proofs of lines of a ledger that had this size. */
const benchInclusion = async (
  app: Client,
  series: string,
  lines: readonly string[],
  size: number,
): Promise<void> => {
  const head = foldSubtrees(planRoot(size).map(await readNodes(app, series, planRoot(size))));
  const indices = Array.from(
    { length: 200 },
    (_, i) => createHash('sha256').update(`${size} ${i}`).digest().readUInt32BE(0) % size,
  );
  let hashes = 0;
  const made = await timed(async () => {
    const paths = [];
    for (const index of indices) {
      const plan = planInclusion(index, size);
      const path = fillPlan(plan, await readNodes(app, series, plan));
      hashes = Math.max(hashes, path.length);
      paths.push({ index, path });
    }
    return paths;
  });
  const checked = await timed(() =>
    made.value.every(({ index, path }) =>
      verifyInclusion({
        leafHash: lineLeaf(lines[index] ?? ''),
        index,
        size,
        path,
        root: head,
      }),
    ),
  );
  demand(checked.value, `inclusion at ${size}`);
  say(
    `inclusion at ${String(size).padStart(7)} ${hashes} hashes (${hashes * 32} bytes), ` +
      `read in ${(made.ms / 200).toFixed(2)} ms, verified in ${(checked.ms / 200).toFixed(3)} ms`,
  );
};

const benchConsistency = async (
  app: Client,
  { series, total }: Bench,
  root: Uint8Array,
): Promise<void> => {
  const older = Math.ceil(total / 3);
  const plan = planConsistency(older, total);
  const path = fillPlan(plan, await readNodes(app, series, plan));
  const olderRoot = foldSubtrees(
    planRoot(older).map(await readNodes(app, series, planRoot(older))),
  );
  const claim = { first: { size: older, root: olderRoot }, second: { size: total, root }, path };
  demand(verifyConsistency(claim), 'consistency');
  say(`consistency ${older} → ${total}: ${path.length} hashes (${path.length * 32} bytes)`);
};

/** The signed head, the root of all lines, and proofs at growing sizes. */
export const benchVerifying = async (bench: Bench, app: Client): Promise<void> => {
  const { series, total } = bench;
  const pair = generateKeyPairSync('ed25519');
  const spki = pair.publicKey.export({ format: 'der', type: 'spki' });
  const key = verifierKey(originOf('bench.example', series), Uint8Array.from(spki.subarray(-32)));
  const root = foldSubtrees(planRoot(total).map(await readNodes(app, series, planRoot(total))));
  const checkpoint = await signCheckpoint({ origin: key.name, size: total, root }, [
    { key, sign: (message) => Uint8Array.from(sign(null, message, pair.privateKey)) },
  ]);
  demand(openCheckpoint(checkpoint, [key]).ok, 'the signed head');

  const { rows } = await app.query<{ line: string }>(
    'select line from record.ledger_line where series_id = $1 order by index',
    [series],
  );
  const lines = rows.map(({ line }) => line);
  demand(lines.length === total, 'the number of lines');
  const whole = await timed(() => {
    let frontier = EMPTY;
    for (const line of lines) frontier = appendLeaf(frontier, lineLeaf(line)).frontier;
    return rootOf(frontier);
  });
  demand(toHex(whole.value) === toHex(root), 'the root of all lines');
  say(`verified whole       ${total.toLocaleString('en')} lines, ${perSecond(total, whole.ms)}`);

  for (const size of [...new Set([100, 1000, 10_000, total])].filter((n) => n <= total))
    await benchInclusion(app, series, lines, size);
  await benchConsistency(app, bench, root);

  const index = Math.floor(total / 2);
  const inclusion = planInclusion(index, total);
  const proof = {
    line: lines[index] ?? '',
    path: fillPlan(inclusion, await readNodes(app, series, inclusion)).map(toHex),
    checkpoint,
  };
  const signed = await timed(() => checkLine(proof, [key]));
  demand(conclude(signed.value.steps) === 'passed', 'a line under the signed head');
  const bytes = JSON.stringify(proof).length;
  say(`a line with its signed head: ${bytes} bytes, verified in ${signed.ms.toFixed(1)} ms`);
};
