import type { EntityManager } from '@mikro-orm/postgresql';
import type { Failure } from '@/domain/failure';
import { failure } from '@/domain/failure';
import { findHex, sha256, toHex, utf8 } from '@/domain/ledger/bytes';
import { opens } from '@/domain/ledger/commitment';
import { lineLeaf, parseLine } from '@/domain/ledger/line';
import { fail, ok, type Result } from '@/domain/result';
import { performAct } from '../../act/perform-act';
import { actIdFor } from '../../notice/act-id';
import type { Ports } from '../../ports';
import { type ErasureDocument, erasureDocument } from '../audit/erasures';
import { type ErasureSubject, eraseLines, listErasable } from './erase-lines';
import type { PublishedErasure } from './list-erasures';
import { findErasureObstacle } from './obstacle';

export interface Reapplied {
  /** Erasures whose content had come back and is gone again. */
  readonly erased: number;
  /** Erasures of which nothing is here. */
  readonly nothingHere: number;
}

type Deps = Pick<Ports, 'db' | 'clock' | 'random' | 'jobs'> & Partial<Pick<Ports, 'recordState'>>;

interface Proven {
  readonly subject: ErasureSubject;
  readonly document: ErasureDocument;
}

/** The document, if the line is one of an erasure and commits to it. */
const findProven = ({ series, line, salt, document }: PublishedErasure): Proven | undefined => {
  const parsed = parseLine(line);
  if (!parsed.ok || parsed.value.kind !== 'content-erased' || parsed.value.series !== series)
    return undefined;
  const { commitments, refs } = parsed.value;
  const stated = commitments.find(({ role }) => role === 'erasure')?.commitment ?? '';
  const [commitment, salted] = [findHex(stated, 32), findHex(salt, 32)];
  if (commitment === undefined || salted === undefined) return undefined;
  if (!opens(commitment, salted, sha256(utf8(document)))) return undefined;
  const read = erasureDocument.safeParse(JSON.parse(document));
  const kind = (['inspection', 'event', 'paperwork'] as const).find((one) => refs[one]);
  const id = kind && refs[kind];
  return read.success && kind !== undefined && id !== undefined
    ? { subject: { kind, id }, document: read.data }
    : undefined;
};

/** What the erasure names and this copy of the record holds: the same line under the same hash. */
const findReturned = async (em: EntityManager, series: string, proven: Proven) => {
  const named = new Set(
    proven.document.contents.map((one) => `${one.line} ${one.leaf} ${one.role}`),
  );
  const here = await listErasable(em, series, proven.subject);
  return here.filter(({ line, leaf, role }) => named.has(`${line} ${leaf} ${role}`));
};

const reapply = (deps: Deps, erasure: PublishedErasure, proven: Proven) => {
  const { series: seriesId, line } = erasure;
  const { subject, document } = proven;
  const id = actIdFor('reapply-erasure', toHex(lineLeaf(line)));
  const request = { id, kind: 'reapply-erasure', seriesId, input: { line } };
  return performAct(deps, null, request, async (act) => {
    const obstacle = await findErasureObstacle(act.em, seriesId, subject);
    if (obstacle !== undefined) return fail(failure('not-in-this-state', obstacle));
    const contents = await findReturned(act.em, seriesId, proven);
    const files = new Set(document.files);
    await eraseLines(act, { seriesId, subject, reason: document.reason, contents, files });
    return ok(null);
  });
};

/**
 * Erases again, after a restore, what was erased since the copy was made. The erasures come from
 * elsewhere: a list kept apart, or the public ledger. Each must open its line's commitment; a line
 * of another hash under the same number is left alone. Each makes a new line of its own.
 */
export const reapplyErasures = async (
  deps: Deps,
  erasures: readonly PublishedErasure[],
): Promise<Result<Reapplied, Failure>> => {
  const proven = erasures.map((erasure) => ({ erasure, proven: findProven(erasure) }));
  let erased = 0;
  const wrong = proven.findIndex((one) => one.proven === undefined);
  if (wrong >= 0) {
    const detail = `Number ${wrong + 1} of the list is no erasure: its line does not commit to it.`;
    return fail(failure('invalid', detail));
  }
  for (const one of proven) {
    if (one.proven === undefined) continue;
    if ((await findReturned(deps.db, one.erasure.series, one.proven)).length === 0) continue;
    const done = await reapply(deps, one.erasure, one.proven);
    if (!done.ok) return done;
    erased += 1;
  }
  return ok({ erased, nothingHere: erasures.length - erased });
};
