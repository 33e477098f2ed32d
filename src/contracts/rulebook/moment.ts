import { instantOf, instantsOf, wallTimeAt } from '@/domain/deadline/zone';

const MOMENT = /^(\d{4})-(\d\d)-(\d\d)(?:T(\d\d):(\d\d)(?::(\d\d))?)?$/;

const UTC = /^\d{4}-\d\d-\d\dT\d\d:\d\d:\d\d\.\d{3}Z$/;

/**
 * A day, or a day with its time (seconds may stay away), as a person writes it for a zone; or an exact
 * instant in UTC, as lasting addresses hold it. Nothing if there is no such day or time.
 */
export const readMoment = (text: string, zone: string): Date | undefined => {
  if (UTC.test(text)) return Number.isNaN(Date.parse(text)) ? undefined : new Date(text);
  const found = MOMENT.exec(text.trim());
  if (found === null) return undefined;
  const [year = 0, month = 0, day = 0, hour = 0, minute = 0, second = 0] = found
    .slice(1)
    .map((part) => Number(part ?? 0));
  const calendar = new Date(Date.UTC(year, month - 1, day));
  const real = calendar.getUTCMonth() === month - 1 && calendar.getUTCDate() === day;
  if (!real || hour > 23 || minute > 59 || second > 59) return undefined;
  return new Date(instantOf(zone, { year, month, day, hour, minute, second }));
};

const two = (value: number): string => String(value).padStart(2, '0');

/** An instant as `readMoment` reads it back, to the minute: `2026-07-01T18:00`. */
export const momentText = (at: Date, zone: string): string => {
  const wall = wallTimeAt(zone, at.getTime());
  const day = `${wall.year}-${two(wall.month)}-${two(wall.day)}`;
  return `${day}T${two(wall.hour)}:${two(wall.minute)}`;
};

/** Every instant at which the zone's clocks show what they show at this one: two in an hour that comes again. */
export const sameOnTheClock = (at: Date, zone: string): readonly Date[] =>
  instantsOf(zone, wallTimeAt(zone, at.getTime())).map((instant) => new Date(instant));
