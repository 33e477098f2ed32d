import { wallTimeAt } from '@/domain/deadline/zone';

const two = (value: number): string => String(value).padStart(2, '0');

/** `2026-07-11 20:41` in the series' zone. */
export const shortInstant = (iso: string, zone: string): string => {
  const { year, month, day, hour, minute } = wallTimeAt(zone, Date.parse(iso));
  return `${year}-${two(month)}-${two(day)} ${two(hour)}:${two(minute)}`;
};

/** `3e9a 51c7`: the beginning of a hash, for reading. */
export const shortHash = (hex: string): string => `${hex.slice(0, 4)} ${hex.slice(4, 8)}`;
