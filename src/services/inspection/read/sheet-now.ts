import type { EntityManager } from '@mikro-orm/postgresql';
import type { SheetNow } from '@/contracts/inspection/sheet';
import type { Actor } from '@/domain/access/permission';
import { absent, type Failure } from '@/domain/failure';
import { type SecondAsked, secondFrom } from '@/domain/inspection/second-set/asked';
import { hideFirst } from '@/domain/inspection/second-set/hide-first';
import { fail, ok, type Result } from '@/domain/result';
import type { Ports } from '../../ports';
import { findInspection, worksOn } from './find-inspection';
import type { InspectionFile } from './inspection-file';
import type { RecordedRows } from './rows';
import { mayTakeSecondSet } from './second-set';

export interface FoundSheet {
  readonly file: InspectionFile;
  readonly second: SecondAsked | undefined;
  readonly now: SheetNow;
}

const namesIn = async (em: EntityManager, rows: RecordedRows): Promise<SheetNow['people']> => {
  const ids = new Set(
    [rows.readings, rows.zeros, rows.remarks].flat().map(({ takenBy }) => takenBy),
  );
  if (ids.size === 0) return {};
  const people = await em.execute<{ id: string; name: string }[]>(
    'select id, name from public.person where id = any(?::uuid[])',
    [`{${[...ids].join(',')}}`],
  );
  return Object.fromEntries(people.map(({ id, name }) => [id, name]));
};

/**
 * The sheet of an inspection for whoever measures it. Whoever takes an independent set, and only they
 * may without being named for the car, gets it without what earlier sets read at its bores.
 */
export const findSheetNow = async (
  deps: Pick<Ports, 'db'>,
  actor: Actor,
  input: {
    readonly inspectionId: string;
    readonly bores: readonly string[];
    readonly set: string | null;
  },
): Promise<Result<FoundSheet, Failure>> => {
  const found = await findInspection(deps, actor, input.inspectionId);
  if (!found.ok) return found;
  const file = found.value;
  const { inspection, gauges, chain } = file;
  const second = secondFrom(inspection.layout, input);
  const takes =
    worksOn(actor, inspection) ||
    (second !== undefined && (await mayTakeSecondSet(deps, actor, inspection)));
  if (!takes) return fail(absent());
  const rows = second === undefined ? file.rows : hideFirst(file.rows, second);
  return ok({
    file,
    second,
    now: {
      batch: chain.batches,
      state: inspection.state,
      correcting: inspection.correctionReason !== '',
      rows,
      gauges,
      people: await namesIn(deps.db, rows),
    },
  });
};
