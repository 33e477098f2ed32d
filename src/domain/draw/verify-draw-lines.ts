import { sha256, utf8 } from '../ledger/bytes';
import type { VerifierKey } from '../ledger/note/verifier-key';
import { type CheckedLine, checkLine } from '../ledger/verify/check-line';
import { lineCommitsTo } from '../ledger/verify/check-opening';
import type { LineProof } from '../ledger/verify/line-proof';
import { answer, notChecked, type Question, type Step } from '../ledger/verify/step';
import { readDrawCommitment } from './documents';

/** A draw's document as published, and the ledger line that commits to it under the role `draw`. */
export interface LoggedDocument {
  readonly document: string;
  readonly salt: string;
  readonly proof: LineProof;
}

const LOGGED: Question = {
  id: 'draw-logged',
  checked: 'Announcement and result stand in the series’ ledger, the announcement first.',
  proves: 'The result was written after the announcement, and neither was changed since.',
  doesNotProve: 'That the result was written at once when the values were known.',
};

const BEFORE: Question = {
  id: 'logged-before-session',
  checked: 'The announcement was logged before the session that made the values.',
  proves: 'By the server’s clock, nobody knew the values when secret and pool were fixed.',
  doesNotProve: 'That the server’s clock was right; a receipt mailed before the session does.',
};

/** Checks when a draw was announced and made. Its arithmetic is `verifyDraw`'s. */
export const verifyDrawLines = (
  announced: LoggedDocument,
  made: LoggedDocument,
  keys: readonly VerifierKey[],
): readonly Step[] => {
  const first = checkLine(announced.proof, keys);
  const second = checkLine(made.proof, keys);
  const commitment = readDrawCommitment(announced.document);
  const logged =
    commits(first, announced, 'draw-committed') &&
    commits(second, made, 'draw-made') &&
    Number(first.line?.index) < Number(second.line?.index) &&
    first.line?.series === second.line?.series &&
    (!commitment.ok || commitment.value.series === first.line?.series);
  return [
    ...first.steps.map((step) => ({ ...step, id: `announced-${step.id}` })),
    ...second.steps.map((step) => ({ ...step, id: `made-${step.id}` })),
    answer(
      LOGGED,
      logged,
      `Lines ${first.line?.index} and ${second.line?.index}.`,
      'The lines do not commit to these documents in this order.',
    ),
    commitment.ok && first.line !== undefined
      ? answer(
          BEFORE,
          first.line.at < commitment.value.sessionAt,
          `Logged ${first.line.at}, session from ${commitment.value.sessionAt}.`,
          `Logged ${first.line.at}, after the session began at ${commitment.value.sessionAt}.`,
        )
      : notChecked(BEFORE, 'The announcement could not be read.'),
  ];
};

const commits = ({ line }: CheckedLine, { document, salt }: LoggedDocument, kind: string) =>
  line?.kind === kind && lineCommitsTo(line, 'draw', salt, sha256(utf8(document)));
