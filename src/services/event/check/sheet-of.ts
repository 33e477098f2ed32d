import type { ChecksShown } from '@/contracts/event/check';

type Checked = ChecksShown['checked'][number];

export interface CarOnSheet {
  readonly entryId: string;
  readonly classId: string;
  readonly className: string;
  readonly carNumber: string;
  /** `inspection`: what is decided about it is decided there. */
  readonly outcome: 'passed' | 'inspection';
  readonly checks: readonly (Omit<Checked, 'entryId' | 'id' | 'correctedBecause'> & {
    readonly correctedBecause?: string;
  })[];
}

export interface EventSheetOfChecks {
  /** Cars of the classes in which something was checked. */
  readonly cars: readonly CarOnSheet[];
  readonly missing: readonly { readonly carNumber: string; readonly clause: string }[];
  /** Classes in which nothing was checked: they are no part of the sheet. */
  readonly without: readonly string[];
  /** The clauses that were checked, by class. */
  readonly clauses: ReadonlyMap<string, readonly string[]>;
}

/** What one page of an event's checks comes to: the checks of the night are those that were begun. */
export const sheetOf = (shown: Omit<ChecksShown, 'records'>): EventSheetOfChecks => {
  const classOf = new Map(shown.cars.map(({ entryId, classId }) => [entryId, classId]));
  const begun = (classId: string) =>
    shown.checks.filter(
      (check) =>
        check.classId === classId &&
        shown.checked.some(
          (one) => one.clause === check.clause && classOf.get(one.entryId) === classId,
        ),
    );
  const clauses = new Map(
    [...new Set(shown.cars.map(({ classId }) => classId))].map((classId) => [
      classId,
      begun(classId),
    ]),
  );
  const cars: CarOnSheet[] = [];
  const missing: { carNumber: string; clause: string }[] = [];
  for (const { inspectionId, ...car } of shown.cars) {
    const asked = clauses.get(car.classId) ?? [];
    if (asked.length === 0) continue;
    const here = shown.checked.filter(({ entryId }) => entryId === car.entryId);
    const open = asked.filter(
      ({ clause, advisory }) =>
        !here.some((one) => one.clause === clause && (one.state === 'within' || advisory)),
    );
    if (inspectionId === null)
      missing.push(...open.map(({ clause }) => ({ carNumber: car.carNumber, clause })));
    cars.push({
      ...car,
      outcome: inspectionId === null ? 'passed' : 'inspection',
      checks: here.map(({ entryId: _, id: __, correctedBecause, ...check }) => ({
        ...check,
        ...(correctedBecause === '' ? {} : { correctedBecause }),
      })),
    });
  }
  const names = new Map(shown.cars.map(({ classId, className }) => [classId, className]));
  return {
    cars,
    missing,
    without: [...clauses]
      .filter(([, asked]) => asked.length === 0)
      .map(([id]) => names.get(id) ?? id),
    clauses: new Map([...clauses].map(([id, asked]) => [id, asked.map(({ clause }) => clause)])),
  };
};
