import { wallTimeAt } from '@/domain/deadline/zone';

const two = (n: number): string => String(n).padStart(2, '0');

/** `07-11 19:12:05` by the zone's clocks: readings follow each other within seconds. */
export const clockWithSeconds = (iso: string, zone: string): string => {
  const { month, day, hour, minute, second } = wallTimeAt(zone, Date.parse(iso));
  return `${two(month)}-${two(day)} ${two(hour)}:${two(minute)}:${two(second)}`;
};
