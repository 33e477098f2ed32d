import { formatDayInZone } from '../deadline/format-in-zone';
import { wallTimeAt } from '../deadline/zone';

const parts = (at: string, zone: string): readonly string[] =>
  formatDayInZone(Date.parse(at), zone).split(' ');

/** `21:00` on the zone's clocks. */
export const clockWords = (at: string, zone: string): string => {
  const { hour, minute } = wallTimeAt(zone, Date.parse(at));
  return [hour, minute].map((part) => String(part).padStart(2, '0')).join(':');
};

/** `11 July 2026` */
export const dayWords = (at: string, zone: string): string => parts(at, zone).slice(1).join(' ');

/** `11 July, 22:48` */
export const dayAndClockWords = (at: string, zone: string): string =>
  `${parts(at, zone).slice(1, 3).join(' ')}, ${clockWords(at, zone)}`;

/** `Sat 11 July` */
export const weekdayWords = (at: string, zone: string): string => {
  const [weekday = '', day, month] = parts(at, zone);
  return `${weekday.slice(0, 3)} ${day} ${month}`;
};

/** `2026-07-12 09:20` */
export const stampWords = (at: string, zone: string): string => {
  const { year, month, day } = wallTimeAt(zone, Date.parse(at));
  const date = [year, month, day].map((part) => String(part).padStart(2, '0')).join('-');
  return `${date} ${clockWords(at, zone)}`;
};

/** `2 Mar 2026` of an ISO 8601 day. */
export const shortDay = (on: string): string => {
  const [year, month, day] = on.split('-').map(Number);
  const names = [
    'Jan',
    'Feb',
    'Mar',
    'Apr',
    'May',
    'June',
    'July',
    'Aug',
    'Sep',
    'Oct',
    'Nov',
    'Dec',
  ];
  return `${day} ${names[(month ?? 1) - 1]} ${year}`;
};
