import { instantOf, wallTimeAt } from './zone';

/** How long a clock runs. */
export type Window =
  | { readonly kind: 'minutes'; readonly minutes: number }
  /** To the end of the n-th day after the day on which the clock started, in the event's zone. */
  | { readonly kind: 'end-of-day'; readonly days: number }
  /** To a wall-clock time (`18:00`) on the n-th day after. */
  | { readonly kind: 'time-of-day'; readonly days: number; readonly time: string };

export interface Deadline {
  /** ISO 8601 instants in UTC. What arrives at `endsAt` itself is still in time. */
  readonly startsAt: string;
  readonly endsAt: string;
  readonly zone: string;
  readonly window: Window;
}

const MINUTE = 60_000;

const endsAt = (startsAt: number, window: Window, zone: string): number => {
  if (window.kind === 'minutes') return startsAt + window.minutes * MINUTE;
  const start = wallTimeAt(zone, startsAt);
  const day = { ...start, day: start.day + window.days, hour: 0, minute: 0, second: 0 };
  if (window.kind === 'end-of-day') return instantOf(zone, { ...day, day: day.day + 1 });
  const [hour = 0, minute = 0] = window.time.split(':').map(Number);
  return instantOf(zone, { ...day, hour, minute });
};

/** When a clock ends that starts at `startsAt` (ISO 8601), in the event's IANA zone. */
export const deadlineFrom = (startsAt: string, window: Window, zone: string): Deadline => ({
  startsAt,
  endsAt: new Date(endsAt(Date.parse(startsAt), window, zone)).toISOString(),
  zone,
  window,
});

/** Judged by the server's time of receipt; the last instant counts. */
export const isInTime = (deadline: Deadline, receivedAt: string): boolean =>
  Date.parse(receivedAt) <= Date.parse(deadline.endsAt);

/** Milliseconds left, never below zero. */
export const timeLeft = (deadline: Deadline, at: string): number =>
  Math.max(0, Date.parse(deadline.endsAt) - Date.parse(at));
