import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { findClockStart, type Publication } from '@/domain/deadline/clock-start';
import { deadlineFrom, isInTime, timeLeft, type Window } from '@/domain/deadline/deadline';
import { formatDeadline, formatInZone, formatOffset } from '@/domain/deadline/format-in-zone';
import { instantOf, instantsOf, isZone, offsetAt, wallTimeAt } from '@/domain/deadline/zone';

const CHICAGO = 'America/Chicago';

// Zones and dates of clock changes: IANA time zone database.
const ends: readonly [string, string, Window, string, string][] = [
  [
    'minutes run through',
    '2026-07-16T01:30:00.000Z',
    { kind: 'minutes', minutes: 30 },
    CHICAGO,
    '2026-07-16T02:00:00.000Z',
  ],
  [
    'minutes are minutes while clocks are set forward',
    '2026-03-08T07:45:00.000Z',
    { kind: 'minutes', minutes: 30 },
    CHICAGO,
    '2026-03-08T08:15:00.000Z',
  ],
  [
    'end of the same local day, though UTC is a day ahead',
    '2026-07-16T01:30:00.000Z',
    { kind: 'end-of-day', days: 0 },
    CHICAGO,
    '2026-07-16T05:00:00.000Z',
  ],
  [
    'two days on, across the loss of an hour',
    '2026-03-07T20:00:00.000Z',
    { kind: 'end-of-day', days: 2 },
    CHICAGO,
    '2026-03-10T05:00:00.000Z',
  ],
  [
    'the short day itself',
    '2026-03-08T12:00:00.000Z',
    { kind: 'end-of-day', days: 0 },
    CHICAGO,
    '2026-03-09T05:00:00.000Z',
  ],
  [
    'the long day itself',
    '2026-11-01T05:30:00.000Z',
    { kind: 'end-of-day', days: 0 },
    CHICAGO,
    '2026-11-02T06:00:00.000Z',
  ],
  [
    'over a month and a leap day',
    '2028-02-27T18:00:00.000Z',
    { kind: 'end-of-day', days: 3 },
    CHICAGO,
    '2028-03-02T06:00:00.000Z',
  ],
  [
    'a time that clocks skip is taken after the jump',
    '2026-03-07T18:00:00.000Z',
    { kind: 'time-of-day', days: 1, time: '02:30' },
    CHICAGO,
    '2026-03-08T08:30:00.000Z',
  ],
  [
    'a time that clocks show twice is the later one',
    '2026-10-31T18:00:00.000Z',
    { kind: 'time-of-day', days: 1, time: '01:30' },
    CHICAGO,
    '2026-11-01T07:30:00.000Z',
  ],
  [
    'southern summer time, half an hour of it',
    '2026-04-04T02:00:00.000Z',
    { kind: 'end-of-day', days: 1 },
    'Australia/Lord_Howe',
    '2026-04-05T13:30:00.000Z',
  ],
  [
    'midnight itself is skipped',
    '2026-04-23T12:00:00.000Z',
    { kind: 'end-of-day', days: 0 },
    'Africa/Cairo',
    '2026-04-23T22:00:00.000Z',
  ],
];

describe('a deadline', () => {
  it.each(ends)('%s', (_, startsAt, window, zone, endsAt) => {
    expect(deadlineFrom(startsAt, window, zone).endsAt).toBe(endsAt);
  });

  it('counts its last millisecond and not the next', () => {
    const deadline = deadlineFrom(
      '2026-07-16T01:30:00.000Z',
      { kind: 'minutes', minutes: 30 },
      CHICAGO,
    );
    expect(isInTime(deadline, '2026-07-16T02:00:00.000Z')).toBe(true);
    expect(isInTime(deadline, '2026-07-16T02:00:00.001Z')).toBe(false);
    expect(timeLeft(deadline, '2026-07-16T01:59:00.000Z')).toBe(60_000);
    expect(timeLeft(deadline, '2026-07-16T03:00:00.000Z')).toBe(0);
  });

  it('of a day ends when the zone shows the next date, in every zone and season', () => {
    const zones = [
      CHICAGO,
      'Europe/Berlin',
      'Asia/Kolkata',
      'Pacific/Auckland',
      'America/St_Johns',
      'UTC',
    ];
    fc.assert(
      fc.property(
        fc.constantFrom(...zones),
        fc.integer({ min: Date.UTC(2020, 0, 1), max: Date.UTC(2035, 0, 1) }),
        fc.integer({ min: 0, max: 40 }),
        (zone, start, days) => {
          const window = { kind: 'end-of-day', days } as const;
          const end = Date.parse(deadlineFrom(new Date(start).toISOString(), window, zone).endsAt);
          const first = wallTimeAt(zone, start);
          const last = wallTimeAt(zone, end - 1);
          const day = (wall: typeof first) =>
            Date.UTC(wall.year, wall.month - 1, wall.day) / 86_400_000;
          expect(day(last) - day(first)).toBe(days);
          expect(day(wallTimeAt(zone, end)) - day(first)).toBe(days + 1);
        },
      ),
    );
  });
});

describe('a zone', () => {
  it('gives back the instant whose wall time it shows', () => {
    fc.assert(
      fc.property(
        fc.integer({ min: Date.UTC(2020, 0, 1) / 1000, max: Date.UTC(2035, 0, 1) / 1000 }),
        (seconds) => {
          const at = seconds * 1000;
          const found = instantOf(CHICAGO, wallTimeAt(CHICAGO, at));
          expect([0, 3_600_000]).toContain(found - at);
          expect(wallTimeAt(CHICAGO, found)).toEqual(wallTimeAt(CHICAGO, at));
        },
      ),
    );
  });

  it('shows an hour twice where clocks go back, and skips one where they go forward', () => {
    const shown = (month: number, day: number, hour: number) =>
      instantsOf(CHICAGO, { year: 2026, month, day, hour, minute: 30, second: 0 }).map((at) =>
        new Date(at).toISOString(),
      );
    expect(shown(11, 1, 1)).toEqual(['2026-11-01T06:30:00.000Z', '2026-11-01T07:30:00.000Z']);
    expect(shown(3, 8, 2)).toEqual([]);
    expect(shown(11, 1, 0)).toEqual(['2026-11-01T05:30:00.000Z']);
    expect(shown(11, 1, 2)).toEqual(['2026-11-01T08:30:00.000Z']);
  });

  it('is known by its IANA name only', () => {
    expect(['America/Chicago', 'UTC', 'Asia/Kolkata'].map(isZone)).toEqual([true, true, true]);
    expect(['Chicago', 'America/Nowhere', '', 'EST'].map(isZone)).toEqual([
      false,
      false,
      false,
      false,
    ]);
  });

  it('has the offset of the instant, before and after clocks change', () => {
    expect(offsetAt(CHICAGO, Date.parse('2026-03-08T07:59:59.999Z'))).toBe(-6 * 3_600_000);
    expect(offsetAt(CHICAGO, Date.parse('2026-03-08T08:00:00.000Z'))).toBe(-5 * 3_600_000);
  });
});

describe('the words', () => {
  it.each([
    ['2026-07-16T02:00:00.000Z', CHICAGO, 'Wednesday 15 July 2026, 21:00 local time (UTC−5)'],
    ['2026-01-16T02:00:05.000Z', CHICAGO, 'Thursday 15 January 2026, 20:00:05 local time (UTC−6)'],
    [
      '2026-07-15T18:30:00.000Z',
      'Asia/Kolkata',
      'Thursday 16 July 2026, 00:00 local time (UTC+5:30)',
    ],
    ['2026-07-15T18:30:00.000Z', 'UTC', 'Wednesday 15 July 2026, 18:30 local time (UTC)'],
  ])('%s in %s', (at, zone, words) => {
    expect(formatInZone(at, zone)).toBe(words);
  });

  it('name the day that ends', () => {
    const deadline = deadlineFrom(
      '2026-10-30T20:00:00.000Z',
      { kind: 'end-of-day', days: 2 },
      CHICAGO,
    );
    expect(deadline.endsAt).toBe('2026-11-02T06:00:00.000Z');
    expect(formatDeadline(deadline)).toBe('Sunday 1 November 2026, 24:00 local time (UTC−6)');
    const minutes = deadlineFrom(
      '2026-07-16T01:30:00.000Z',
      { kind: 'minutes', minutes: 30 },
      CHICAGO,
    );
    expect(formatDeadline(minutes)).toBe('Wednesday 15 July 2026, 21:00 local time (UTC−5)');
  });

  it('write offsets with the minus sign', () => {
    expect([-12_600_000, 0, 20_700_000].map(formatOffset)).toEqual(['UTC−3:30', 'UTC', 'UTC+5:45']);
  });
});

describe('the start of a clock', () => {
  const row = (
    at: string,
    lawful: boolean,
    trigger: Publication['trigger'] = 'results-published',
  ) => ({ trigger, at, lawful, where: 'notice board' });

  it('is the earliest lawful publication', () => {
    const early = row('2026-07-16T01:00:00.000Z', false);
    const lawful = row('2026-07-16T01:30:00.000Z', true);
    const repeat = row('2026-07-16T03:00:00.000Z', true);
    expect(findClockStart('results-published', [repeat, lawful, early])).toEqual(lawful);
  });

  it('is nothing before there is one', () => {
    expect(
      findClockStart('verdict-published', [row('2026-07-16T01:00:00.000Z', true)]),
    ).toBeUndefined();
    expect(
      findClockStart('results-published', [row('2026-07-16T01:00:00.000Z', false)]),
    ).toBeUndefined();
  });
});
