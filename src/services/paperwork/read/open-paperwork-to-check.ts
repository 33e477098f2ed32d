import type { EntityManager } from '@mikro-orm/postgresql';
import type { Actor } from '@/domain/access/permission';
import { absent, type Failure } from '@/domain/failure';
import type { PaperworkDocument } from '@/domain/paperwork/document';
import { fail, ok, type Result } from '@/domain/result';
import type { Ports } from '../../ports';
import { findBefore } from './find-before';
import { findSeenBefore, type SeenBefore } from './find-seen-before';
import { findDecidableRow, type OpenedVersion, openRow } from './open-version';
import type { PaperworkRow } from './read-row';

export interface GuardianSigned {
  readonly guardian: string;
  readonly method: 'fresh-sign-in' | 'e-mailed-link';
}

export interface PaperworkToCheck extends OpenedVersion {
  /** The version before this one, of this paperwork or else of this engine in the series. */
  readonly previous: PaperworkDocument | undefined;
  /** `version 1`, or where it stands. */
  readonly previousWords: string | undefined;
  /** Other cars that this engine is declared for in the series, whoever declared it. */
  readonly carsOfEngine: readonly string[];
  readonly seenBefore: readonly SeenBefore[];
  /** Who signed this version for a competitor under age. */
  readonly signature: GuardianSigned | undefined;
}

const findSignature = async (
  em: EntityManager,
  { seriesId, id }: PaperworkRow,
  number: number,
): Promise<GuardianSigned | undefined> => {
  const [row] = await em.execute<GuardianSigned[]>(
    `select p.name as guardian, g.method from record.guardian_signature g
     join public.person p on p.id = g.guardian_id
     where g.series_id = ? and g.paperwork_id = ? and g.number = ?`,
    [seriesId, id, number],
  );
  return row;
};

const findOtherCars = async (
  em: EntityManager,
  { seriesId, id, engineId }: PaperworkRow,
): Promise<readonly string[]> => {
  const rows = await em.execute<{ car: string }[]>(
    `select distinct car_number as car from public.paperwork
     where series_id = ? and engine_id = ? and id <> ? and versions > 0 and state <> 'withdrawn'
     order by car_number`,
    [seriesId, engineId, id],
  );
  return rows.map(({ car }) => car);
};

/** The version that waits, or one asked for by number, beside the one before it. */
export const openPaperworkToCheck = async (
  deps: Pick<Ports, 'db'>,
  actor: Actor,
  input: { readonly paperworkId: string; readonly number?: number | undefined },
): Promise<Result<PaperworkToCheck, Failure>> => {
  const row = await findDecidableRow(deps.db, actor, input.paperworkId);
  if (row === undefined) return fail(absent());
  const number = input.number ?? row.versions;
  const opened = await openRow(deps.db, row, number);
  if (opened === undefined) return fail(absent());
  const before = await findBefore(deps.db, row, number - 1);
  return ok({
    ...opened,
    previousWords: before?.words,
    previous: before?.document,
    carsOfEngine: await findOtherCars(deps.db, row),
    signature: await findSignature(deps.db, row, number),
    seenBefore: await findSeenBefore(deps.db, row, number),
  });
};
