import { type Need, rightsOn } from '@/domain/access/paperwork-access';
import type { Actor } from '@/domain/access/permission';
import { absent, type Failure } from '@/domain/failure';
import type { PaperworkDocument } from '@/domain/paperwork/document';
import { fail, ok, type Result } from '@/domain/result';
import { Person } from '@/entities/people/person';
import { findGuardian } from '../../people/find-guardian';
import type { Ports } from '../../ports';
import { type CheckedPaperwork, checkRow, findOwnRow, noRules } from '../check-paperwork';
import { findBefore } from './find-before';
import { type PaperworkRow, readVersions, type VersionRow } from './read-row';

export interface OpenedPaperwork {
  readonly row: PaperworkRow;
  readonly checked: CheckedPaperwork;
  readonly versions: readonly VersionRow[];
  /** What the actor may do with it. */
  readonly rights: readonly Need[];
  /** Who signs for a competitor under age, and whether that is the actor. */
  readonly guardian: { readonly name: string; readonly isActor: boolean } | undefined;
  /** The last that was handed in of this engine in the series, to see what changed. */
  readonly before: { readonly words: string; readonly document: PaperworkDocument } | undefined;
}

const guardianOf = async (
  { db }: Pick<Ports, 'db'>,
  actor: Actor,
  { seriesId, competitorId }: PaperworkRow,
): Promise<OpenedPaperwork['guardian']> => {
  const found = await findGuardian(db, seriesId, competitorId);
  if (found === undefined) return undefined;
  const own = { id: actor.personId, email: found.guardianEmail };
  const isActor = found.guardianId === actor.personId || (await db.count(Person, own)) > 0;
  return { name: found.guardianName, isActor };
};

/** The actor's own paperwork, or paperwork open to them, with everything its page shows. */
export const openPaperwork = async (
  deps: Pick<Ports, 'db' | 'clock'>,
  actor: Actor,
  paperworkId: string,
): Promise<Result<OpenedPaperwork, Failure>> => {
  const row = await findOwnRow(deps.db, actor, paperworkId);
  if (row === undefined) return fail(absent());
  const checked = await checkRow(deps.db, row, deps.clock.now());
  if (checked === undefined) return fail(noRules());
  return ok({
    row,
    checked,
    versions: await readVersions(deps.db, row.seriesId, row.id),
    rights: rightsOn(actor, row),
    guardian: await guardianOf(deps, actor, row),
    before: await findBefore(deps.db, row, row.versions),
  });
};
