import type { Deadline } from './deadline';
import { offsetAt, wallTimeAt } from './zone';

const WEEKDAYS = ['Sunday', 'Monday', 'Tuesday', 'Wednesday', 'Thursday', 'Friday', 'Saturday'];
const MONTHS = [
  'January',
  'February',
  'March',
  'April',
  'May',
  'June',
  'July',
  'August',
  'September',
  'October',
  'November',
  'December',
];

const two = (value: number): string => String(value).padStart(2, '0');

/** `UTC−5`, `UTC+5:30`, `UTC`. */
export const formatOffset = (milliseconds: number): string => {
  if (milliseconds === 0) return 'UTC';
  const minutes = Math.round(Math.abs(milliseconds) / 60_000);
  const rest = minutes % 60 === 0 ? '' : `:${two(minutes % 60)}`;
  return `UTC${milliseconds < 0 ? '−' : '+'}${Math.floor(minutes / 60)}${rest}`;
};

/** `Wednesday 15 July 2026` as the zone's calendar shows it at an instant (epoch milliseconds). */
export const formatDayInZone = (at: number, zone: string): string => {
  const { year, month, day } = wallTimeAt(zone, at);
  const weekday = WEEKDAYS[new Date(Date.UTC(year, month - 1, day)).getUTCDay()];
  return `${weekday} ${day} ${MONTHS[month - 1]} ${year}`;
};

/** `Wednesday 15 July 2026, 21:00 local time (UTC−5)`; seconds stand only where there are any. */
export const formatInZone = (at: string, zone: string): string => {
  const instant = Date.parse(at);
  const { hour, minute, second } = wallTimeAt(zone, instant);
  const time = `${two(hour)}:${two(minute)}${second === 0 ? '' : `:${two(second)}`}`;
  const offset = formatOffset(offsetAt(zone, instant));
  return `${formatDayInZone(instant, zone)}, ${time} local time (${offset})`;
};

/** A deadline's end; the end of a day is named by the day that ends, not by the midnight after it. */
export const formatDeadline = (deadline: Deadline): string => {
  if (deadline.window.kind !== 'end-of-day') return formatInZone(deadline.endsAt, deadline.zone);
  const last = Date.parse(deadline.endsAt) - 1;
  const offset = formatOffset(offsetAt(deadline.zone, last));
  return `${formatDayInZone(last, deadline.zone)}, 24:00 local time (${offset})`;
};
