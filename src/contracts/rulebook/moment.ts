import { instantOf, wallTimeAt } from '@/domain/deadline/zone';

const MOMENT = /^(\d{4})-(\d\d)-(\d\d)(?:T(\d\d):(\d\d))?$/;

/** A day, or a day with its time, as a person writes it for a zone: nothing if there is no such day or time. */
export const readMoment = (text: string, zone: string): Date | undefined => {
  const found = MOMENT.exec(text.trim());
  if (found === null) return undefined;
  const [year = 0, month = 0, day = 0, hour = 0, minute = 0] = found
    .slice(1)
    .map((part) => Number(part ?? 0));
  const calendar = new Date(Date.UTC(year, month - 1, day));
  const real = calendar.getUTCMonth() === month - 1 && calendar.getUTCDate() === day;
  if (!real || hour > 23 || minute > 59) return undefined;
  return new Date(instantOf(zone, { year, month, day, hour, minute, second: 0 }));
};

const two = (value: number): string => String(value).padStart(2, '0');

/** An instant as `readMoment` reads it back, to the minute: `2026-07-01T18:00`. */
export const momentText = (at: Date, zone: string): string => {
  const wall = wallTimeAt(zone, at.getTime());
  const day = `${wall.year}-${two(wall.month)}-${two(wall.day)}`;
  return `${day}T${two(wall.hour)}:${two(wall.minute)}`;
};
