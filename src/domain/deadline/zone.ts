/** A wall-clock time in a zone; months count from 1, seconds and parts of them may be left at 0. */
export interface WallTime {
  readonly year: number;
  readonly month: number;
  readonly day: number;
  readonly hour: number;
  readonly minute: number;
  readonly second: number;
}

const HOUR = 3_600_000;
const DAY = 24 * HOUR;

const formats = new Map<string, Intl.DateTimeFormat>();

const formatFor = (zone: string): Intl.DateTimeFormat => {
  const known = formats.get(zone);
  if (known !== undefined) return known;
  const format = new Intl.DateTimeFormat('en-US', {
    timeZone: zone,
    calendar: 'gregory',
    numberingSystem: 'latn',
    hourCycle: 'h23',
    year: 'numeric',
    month: 'numeric',
    day: 'numeric',
    hour: 'numeric',
    minute: 'numeric',
    second: 'numeric',
  });
  formats.set(zone, format);
  return format;
};

/** Whether this is a name of the IANA time zone database that this program knows. */
export const isZone = (zone: string): boolean => {
  try {
    formatFor(zone);
    return zone.includes('/') || zone === 'UTC';
  } catch {
    return false;
  }
};

/** What a clock on the wall shows at an instant (epoch milliseconds). */
export const wallTimeAt = (zone: string, at: number): WallTime => {
  const parts = new Map(
    formatFor(zone)
      .formatToParts(at)
      .map((part) => [part.type, Number(part.value)]),
  );
  const get = (type: Intl.DateTimeFormatPartTypes): number => parts.get(type) ?? 0;
  return {
    year: get('year'),
    month: get('month'),
    day: get('day'),
    hour: get('hour'),
    minute: get('minute'),
    second: get('second'),
  };
};

const asUtc = (wall: WallTime): number =>
  Date.UTC(wall.year, wall.month - 1, wall.day, wall.hour, wall.minute, wall.second);

/** Milliseconds that the zone is ahead of UTC at an instant; negative west of Greenwich. */
export const offsetAt = (zone: string, at: number): number => {
  const second = Math.floor(at / 1000) * 1000;
  return asUtc(wallTimeAt(zone, second)) - second;
};

/**
 * Every instant (epoch milliseconds, in order) at which the zone's clocks show this wall time: one as
 * a rule, two in the hour that comes again where clocks are set back, none in an hour they skip.
 */
export const instantsOf = (zone: string, wall: WallTime): readonly number[] => {
  const utc = asUtc(wall);
  const shown = [utc - offsetAt(zone, utc - DAY), utc - offsetAt(zone, utc + DAY)];
  return [...new Set(shown)]
    .filter((at) => at + offsetAt(zone, at) === utc)
    .sort((one, other) => one - other);
};

/**
 * The instant at which the zone's clocks show this wall time. Where they show it twice (clocks
 * set back) the later one; where they skip it (clocks set forward) the same length of time after
 * the jump: 02:30 that does not exist is 03:30. Both favour the person who has to be in time.
 * Days beyond the month's end run on into the next.
 */
export const instantOf = (zone: string, wall: WallTime): number => {
  const utc = asUtc(wall);
  return instantsOf(zone, wall).at(-1) ?? utc - offsetAt(zone, utc - DAY);
};
