import type { EntityManager } from '@mikro-orm/postgresql';
import { type Failure, failure, invalid } from '@/domain/failure';
import { fail, ok, type Result } from '@/domain/result';
import type { Inspection } from '@/entities/event/inspection';
import { listInspectors } from './list-inspectors';

/** Whoever is free, in one sentence; those with nothing open first. */
export const freeWords = (
  people: readonly { name: string; interest?: string | undefined; busyWith: number }[],
): string => {
  const free = people
    .filter(({ interest }) => interest === undefined)
    .sort((a, b) => a.busyWith - b.busyWith)
    .map(({ name, busyWith }) => (busyWith === 0 ? name : `${name} (has ${busyWith} open)`));
  return free.length === 0
    ? 'Nobody else is free: invite an inspector, or ask another series.'
    : `Free: ${free.join(', ')}.`;
};

/** Puts a person in charge of an inspection, unless they have an interest in its car. */
export const takeSeat = async (
  em: EntityManager,
  inspection: Inspection,
  inspectorId: string,
): Promise<Result<{ readonly name: string }, Failure>> => {
  const offered = await listInspectors({ db: em }, inspection);
  const chosen = offered.find((person) => person.id === inspectorId);
  if (chosen === undefined)
    return fail(
      invalid([{ pointer: '/inspectorId', detail: 'Choose an inspector of this series.' }]),
    );
  if (chosen.interest !== undefined)
    return fail(
      failure(
        'conflict-of-interest',
        `${chosen.name} ${chosen.interest} and cannot inspect this car. ${freeWords(offered)}`,
        [
          {
            pointer: '/inspectorId',
            detail: `${chosen.name} ${chosen.interest} and cannot inspect this car. ${freeWords(offered)}`,
          },
        ],
      ),
    );
  inspection.inspectorId = inspectorId;
  return ok({ name: chosen.name });
};
