import type { FieldProblem } from '@/components/form/problems';
import { announceRequest, valuesRequest } from '@/contracts/draw/draw';
import { readBody } from '@/contracts/read-body';
import { instantOf, wallTimeAt } from '@/domain/deadline/zone';
import type { DrawCommitment } from '@/domain/draw/documents';
import type { Failure } from '@/domain/failure';

export type Typed = ReadonlyMap<string, string>;

/** How many values the form takes. */
export const VALUE_ROWS = 4;

const two = (value: number): string => String(value).padStart(2, '0');

/** `2026-07-11T18:00` on the zone's clocks, as the browser's field writes it. */
export const localTime = (at: number, zone: string): string => {
  const { year, month, day, hour, minute } = wallTimeAt(zone, at);
  return `${year}-${two(month)}-${two(day)}T${two(hour)}:${two(minute)}`;
};

/** The instant that was written on the zone's clocks; what cannot be read stays as it is. */
export const instantWritten = (text: string, zone: string): string => {
  const [, ...parts] = /^(\d{4})-(\d\d)-(\d\d)T(\d\d):(\d\d)(?::\d\d)?$/.exec(text) ?? [];
  const [year, month, day, hour, minute] = parts.map(Number);
  if ([year, month, day, hour, minute].some((part) => part === undefined)) return text;
  const wall = { year, month, day, hour, minute, second: 0 } as Parameters<typeof instantOf>[1];
  return new Date(instantOf(zone, wall)).toISOString();
};

const FIVE_MINUTES = 300_000;

/** When the values most likely come to be: the event's start, or soon, on a round five minutes. */
export const usualSession = (startsAt: Date, now: Date): number =>
  startsAt > now
    ? startsAt.getTime()
    : Math.ceil((now.getTime() + 2 * FIVE_MINUTES) / FIVE_MINUTES) * FIVE_MINUTES;

/** The form as it is first shown. */
export const firstTyped = (
  usual: DrawCommitment['values'],
  session: string,
  select: string,
): Typed =>
  new Map([
    ['select', select],
    ['sessionAt', session],
    ...usual.slice(0, VALUE_ROWS).flatMap(
      ({ name, ifMissing, substitute }, i) =>
        [
          [`value-${i}-name`, name],
          [`value-${i}-ifMissing`, ifMissing],
          [`value-${i}-substitute`, substitute],
        ] as const,
    ),
  ]);

const rowsIn = (typed: Typed): readonly number[] =>
  Array.from({ length: VALUE_ROWS }, (_, i) => i).filter(
    (i) =>
      (typed.get(`value-${i}-name`) ?? '').trim() !== '' ||
      typed.get(`value-${i}-ifMissing`) === 'substitute',
  );

export const readAnnounceForm = (
  typed: Typed,
  of: { readonly eventId: string; readonly classId: string; readonly zone: string },
) => {
  const text = (name: string) => (typed.get(name) ?? '').trim();
  return readBody(announceRequest, {
    act: text('act'),
    id: text('draw'),
    eventId: of.eventId,
    classId: of.classId,
    poolHash: text('poolHash'),
    select: /^\d{1,3}$/.test(text('select')) ? Number(text('select')) : text('select'),
    sessionAt: instantWritten(text('sessionAt'), of.zone),
    values: rowsIn(typed).map((i) => ({
      name: text(`value-${i}-name`),
      ifMissing: text(`value-${i}-ifMissing`),
      // The field shows only where another value takes the place; what it held before is no part.
      substitute:
        text(`value-${i}-ifMissing`) === 'substitute' ? text(`value-${i}-substitute`) : '',
    })),
  });
};

/** `21417 21390` as it is spoken; a leading zero is no part of a number. */
const numbersIn = (text: string): readonly string[] =>
  text
    .split(/[\s;]+/)
    .filter((part) => part !== '')
    .map((part) => (/^0+\d/.test(part) ? part.replace(/^0+(?=\d)/, '') : part));

export const readValuesForm = (typed: Typed, announced: DrawCommitment['values']) =>
  readBody(valuesRequest, {
    act: typed.get('act') ?? '',
    values: announced.map(({ name }, i) => {
      const source = typed.get(`value-${i}-source`) ?? '';
      const numbers = source === 'missing' ? [] : numbersIn(typed.get(`value-${i}-numbers`) ?? '');
      return { name, source, numbers };
    }),
  });

/** Problems by the ids of the form's fields: `/values/1/name` stands at `value-1-name`. */
export const drawProblems = (failure: Failure, typed?: Typed): readonly FieldProblem[] => {
  const rows = typed && rowsIn(typed);
  const seen = new Set<string>();
  return (failure.faults ?? [{ pointer: '', detail: failure.detail }]).flatMap(
    ({ pointer, detail }): FieldProblem[] => {
      const [, first = '', at, last = ''] = pointer.split('/');
      const row = at === undefined ? undefined : (rows?.[Number(at)] ?? Number(at));
      const field = first === 'values' ? `value-${row ?? 0}-${last || 'name'}` : first;
      if (seen.has(`${field} ${detail}`)) return [];
      seen.add(`${field} ${detail}`);
      return field === '' ? [{ message: detail }] : [{ field, message: detail }];
    },
  );
};
