import * as z from 'zod/mini';
import { isZone } from '@/domain/deadline/zone';
import { findLapSeconds } from '@/domain/event/lap-time';

const act = z.uuid('The act needs its identifier.');
const id = z.uuid('This is no identifier.');
const text = (what: string, most: number) =>
  z
    .string()
    .check(z.minLength(1, `${what} is missing.`), z.maxLength(most, `At most ${most} characters.`));

export const carNumber = z
  .string()
  .check(
    z.regex(/^[0-9A-Z]{1,6}$/, 'A car number is one to six digits and capital letters, as 12J.'),
  );

const instant = z.iso.datetime('Write the day and time.');

export const eventRequest = z
  .strictObject({
    act,
    id,
    seasonId: id,
    slug: z
      .string()
      .check(z.regex(/^[a-z0-9]+(-[a-z0-9]+)*$/, 'Small letters, digits and hyphens.')),
    name: text('The event’s name', 120),
    track: text('The track', 120),
    zone: z.string().check(z.refine(isZone, 'This time zone is not known, e.g. America/Chicago.')),
    startsAt: instant,
    endsAt: instant,
    protestMinutes: z
      .int()
      .check(z.gte(1, 'At least one minute.'), z.lte(43_200, 'At most 30 days.')),
  })
  .check((context) => {
    if (Date.parse(context.value.endsAt) < Date.parse(context.value.startsAt))
      context.issues.push({
        code: 'custom',
        input: context.value.endsAt,
        path: ['endsAt'],
        message: 'The event ends before it starts.',
      });
  });

export const entryRow = z.strictObject({
  id,
  classId: z.uuid('Choose a class.'),
  carNumber,
  competitorName: text('The competitor', 120),
  competitorEmail: z.optional(z.string().check(z.maxLength(254))),
  engineReference: z.string().check(z.maxLength(40, 'At most 40 characters.')),
  position: z.nullable(z.int().check(z.gte(1, 'Positions count from 1.'), z.lte(999))),
  driver: z.optional(z.string().check(z.maxLength(120, 'At most 120 characters.'))),
  /** Lap times as they were written, in order; they replace those kept before. */
  laps: z.optional(
    z
      .array(
        z.string().check(
          z.maxLength(20),
          z.refine((text) => findLapSeconds(text) !== undefined, 'This is no lap time.'),
        ),
      )
      .check(z.maxLength(500, 'At most 500 laps.')),
  ),
});

export const entriesRequest = z.strictObject({
  act,
  entries: z.array(entryRow).check(z.minLength(1, 'No entry was sent.'), z.maxLength(500)),
  /** Where the cars come late: why. Each is then written as a late entry. */
  lateReason: z.optional(z.string().check(z.maxLength(300, 'At most 300 characters.'))),
  /** Under which columns the fields were found, to be offered the next time. */
  columns: z.optional(z.record(z.string(), z.string().check(z.maxLength(120)))),
});

export const ENTRY_CHANGES = ['scratched', 'restored', 'class', 'engine', 'driver'] as const;

export const entryChangeRequest = z.strictObject({
  act,
  kind: z.enum(ENTRY_CHANGES, 'Choose what changes.'),
  /** The class's id, the engine, the driver; empty where a car is scratched or restored. */
  becomes: z.string().check(z.maxLength(120, 'At most 120 characters.')),
  reason: z.string().check(z.maxLength(300, 'At most 300 characters.')),
});

export type EntryChange = z.output<typeof entryChangeRequest>;

export const positionsRequest = z.strictObject({
  act,
  positions: z
    .array(
      z.strictObject({
        entryId: id,
        position: z.nullable(z.int().check(z.gte(1, 'Positions count from 1.'), z.lte(999))),
        state: z.enum(['entered', 'withdrawn']),
      }),
    )
    .check(z.minLength(1, 'Nothing was sent.'), z.maxLength(500)),
});

/** `drawn` comes from a draw and `failed-check` from a check; by hand a car is nominated with a reason. */
export const HAND_PICK_REASONS = ['position', 'protested', 'nominated'] as const;

export const PICK_REASONS = [
  'position',
  'protested',
  'nominated',
  'drawn',
  'failed-check',
] as const;

export const picksRequest = z.strictObject({
  act,
  picks: z
    .array(
      z
        .strictObject({
          inspectionId: id,
          entryId: id,
          because: z.enum(HAND_PICK_REASONS, 'Say why the car is picked.'),
          words: z.string().check(z.maxLength(300, 'At most 300 characters.')),
          /** Name of a position map, where there is no accepted paperwork to take it from. */
          layout: z.optional(z.string().check(z.maxLength(80))),
        })
        .check((context) => {
          if (context.value.because === 'nominated' && context.value.words.trim() === '')
            context.issues.push({
              code: 'custom',
              input: context.value.words,
              path: ['words'],
              message: 'Say why this car is nominated.',
            });
        }),
    )
    .check(z.minLength(1, 'No car is picked.'), z.maxLength(100)),
});

export type EventRequest = z.output<typeof eventRequest>;
export type EntryRow = z.output<typeof entryRow>;
export type PickReason = (typeof PICK_REASONS)[number];
export type Pick = Omit<z.output<typeof picksRequest>['picks'][number], 'because'> & {
  readonly because: PickReason;
};
