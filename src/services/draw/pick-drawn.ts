import type { EntityManager } from '@mikro-orm/postgresql';
import type { DrawnCar } from '@/contracts/draw/draw';
import { type Actor, may } from '@/domain/access/permission';
import { readDrawMade } from '@/domain/draw/documents';
import { absent, type Failure, failure, invalid } from '@/domain/failure';
import { isId } from '@/domain/is-id';
import { fail, ok, type Result } from '@/domain/result';
import { pickCars } from '../event/pick-cars';
import type { Ports } from '../ports';
import { type DrawRow, findDrawRow } from './find-history';

interface Found {
  readonly car: string;
  readonly entryId: string;
  readonly withdrawn: boolean;
  readonly inspectionId: string | null;
  readonly because: string | null;
}

/** The drawn cars in the order drawn, with what became of each. */
export const listDrawnCars = async (
  em: EntityManager,
  seriesId: string,
  row: DrawRow,
): Promise<readonly (DrawnCar & { readonly entryId: string })[]> => {
  const made = readDrawMade(row.endDocument ?? '');
  if (!made.ok) throw new Error(`Draw ${row.id} was not made.`);
  const entries = await em.execute<Found[]>(
    `select e.car_number as car, e.id as "entryId", e.state = 'withdrawn' as withdrawn,
            i.id as "inspectionId", i.picked_because as because
     from public.entry e
     left join public.inspection i on i.series_id = e.series_id and i.entry_id = e.id
     where e.series_id = ? and e.event_id = ? and e.class_id = ?`,
    [seriesId, row.eventId, row.classId],
  );
  return made.value.selected.flatMap(({ car }) => {
    const entry = entries.find((one) => one.car === car);
    if (entry === undefined) return [];
    const { entryId, inspectionId, because, withdrawn } = entry;
    const picked = because === 'drawn' ? 'picked' : 'picked-before';
    const state = inspectionId !== null ? picked : withdrawn ? 'withdrawn' : 'to-pick';
    return [{ car, state, inspectionId, entryId }];
  });
};

/** Opens the inspections of the drawn cars: those that are neither picked already nor withdrawn. */
export const pickDrawn = async (
  deps: Pick<Ports, 'db' | 'clock' | 'random' | 'jobs'>,
  actor: Actor,
  input: {
    readonly act: string;
    readonly seriesId: string;
    readonly drawId: string;
    readonly inspectionIds: readonly string[];
  },
): Promise<Result<{ readonly cars: readonly DrawnCar[] }, Failure>> => {
  const { act, seriesId, drawId, inspectionIds } = input;
  if (!may(actor, 'cars.pick', seriesId) || !isId(drawId)) return fail(absent());
  const row = await findDrawRow(deps.db, seriesId, drawId);
  if (row === undefined) return fail(absent());
  if (row.end !== 'made') return fail(failure('not-in-this-state', 'This draw was not made.'));
  const drawn = await listDrawnCars(deps.db, seriesId, row);
  const picks = drawn.flatMap(({ state, entryId }, i) =>
    state === 'to-pick'
      ? [{ inspectionId: inspectionIds[i] ?? '', entryId, because: 'drawn' as const, place: i + 1 }]
      : [],
  );
  if (picks.some(({ inspectionId }) => inspectionId === ''))
    return fail(invalid([{ pointer: '/inspectionIds', detail: 'Give an id for each drawn car.' }]));
  if (picks.length > 0) {
    const picked = await pickCars(deps, actor, {
      act,
      seriesId,
      eventId: row.eventId,
      picks: picks.map(({ place, ...pick }) => ({ ...pick, words: `Drawn, place ${place}` })),
    });
    if (!picked.ok) return picked;
  }
  const after = await listDrawnCars(deps.db, seriesId, row);
  return ok({ cars: after.map(({ entryId: _, ...car }) => car) });
};
