import { type Checkpoint, isOriginOf, openCheckpoint } from '../checkpoint';
import { type Line, lineLeaf, parseLine } from '../line';
import type { VerifierKey } from '../note/verifier-key';
import { verifyConsistency, verifyInclusion } from '../verify-proof';
import { type Extension, hashesOf, type LineProof } from './line-proof';
import { answer, failed, notChecked, passed, type Question, type Step } from './step';

export interface CheckedLine {
  readonly steps: readonly Step[];
  /** Present when the line could be read, whether or not the other steps passed. */
  readonly line?: Line;
  /** Present when a trusted key signed it. */
  readonly checkpoint?: Checkpoint;
}

const LINE: Question = {
  id: 'line-form',
  checked: 'The ledger line is complete and written in its one canonical form.',
  proves: 'The line says one thing only and cannot be read in two ways.',
  doesNotProve: 'Not yet that the line stands in the ledger.',
};

const SIGNED: Question = {
  id: 'checkpoint-signed',
  checked: 'The head of the ledger is signed with the series’ key.',
  proves: 'Whoever holds the series’ key stood by the whole ledger up to this head.',
  doesNotProve: 'That nobody else got hold of the key, or that what was recorded is true.',
};

const SERIES: Question = {
  id: 'same-ledger',
  checked: 'The line and the signed head belong to the same series.',
  proves: 'The line was not borrowed from another ledger.',
  doesNotProve: 'Who the people behind the series are.',
};

const INCLUDED: Question = {
  id: 'line-included',
  checked: 'The line stands in the ledger at its own number, under the signed head.',
  proves: 'The line was in the ledger when the head was signed and has not been changed since.',
  doesNotProve:
    'That the clock was right when the line was written: the time in it is the server’s word.',
};

const EXTENDED: Question = {
  id: 'only-appended',
  checked: 'A newer signed head of the ledger contains the older one unchanged.',
  proves: 'Nothing before the older head was removed, reordered or rewritten.',
  doesNotProve: 'That no other history was shown to somebody else; compare heads to see that.',
};

/** Checks a line against the keys the reader trusts. */
export const checkLine = (proof: LineProof, keys: readonly VerifierKey[]): CheckedLine => {
  const parsed = parseLine(proof.line);
  const opened = openCheckpoint(proof.checkpoint, keys);
  const line = parsed.ok ? parsed.value : undefined;
  const checkpoint = opened.ok ? opened.value : undefined;
  const steps = [
    parsed.ok
      ? passed(LINE, `Line ${parsed.value.index}, ${parsed.value.kind}, ${parsed.value.at}.`)
      : failed(LINE, parsed.failure.detail),
    opened.ok
      ? passed(SIGNED, `${opened.value.origin}, ${opened.value.size} lines.`)
      : failed(SIGNED, opened.failure.detail),
  ];
  if (line === undefined || checkpoint === undefined) {
    const why = 'The steps before did not hold.';
    return {
      steps: [...steps, notChecked(SERIES, why), notChecked(INCLUDED, why)],
      ...(line && { line }),
      ...(checkpoint && { checkpoint }),
    };
  }
  const { origin, size, root } = checkpoint;
  const included = verifyInclusion({
    leafHash: lineLeaf(proof.line),
    index: Number(line.index),
    size,
    path: hashesOf(proof.path),
    root,
  });
  return {
    steps: [
      ...steps,
      answer(
        SERIES,
        isOriginOf(origin, line.series),
        `Both name series ${line.series}.`,
        `The line names series ${line.series}, the head ${origin}.`,
      ),
      answer(
        INCLUDED,
        included,
        `Line ${line.index} leads to the signed root in ${proof.path.length} steps.`,
        `Line ${line.index} does not lead to the signed root.`,
      ),
    ],
    line,
    checkpoint,
  };
};

/** Checks that a newer head only appends to an older one that was verified before. */
export const checkExtension = (
  older: Checkpoint,
  extension: Extension,
  keys: readonly VerifierKey[],
): Step => {
  const opened = openCheckpoint(extension.checkpoint, keys);
  if (!opened.ok) return failed(EXTENDED, opened.failure.detail);
  const newer = opened.value;
  if (newer.origin !== older.origin) return failed(EXTENDED, 'The heads are of two ledgers.');
  const holds = verifyConsistency({
    first: older,
    second: newer,
    path: hashesOf(extension.path),
  });
  return answer(
    EXTENDED,
    holds,
    `The ledger grew from ${older.size} to ${newer.size} lines and kept the first ${older.size}.`,
    `The ledger of ${newer.size} lines does not contain the one of ${older.size} lines unchanged.`,
  );
};
