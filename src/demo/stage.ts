import type { Composition } from '@/composition';
import type { Actor } from '@/domain/access/permission';
import { instantOf, wallTimeAt } from '@/domain/deadline/zone';
import type { Failure } from '@/domain/failure';
import type { Result } from '@/domain/result';
import type { Clock, Ports } from '@/services/ports';
import { type Chance, chanceFrom } from './make/chance';
import type { DemoPerson } from './people';

export const ZONE = 'America/Chicago';
const SEED = 2231;
const DAY = 86_400_000;

/** The demo's past is written through the same use cases, by a clock that is set back. */
export class DemoClock implements Clock {
  #at: Date;
  constructor(at: Date) {
    this.#at = at;
  }
  now(): Date {
    return this.#at;
  }
  /** Every act a little later than the one before. */
  set(at: Date): void {
    this.#at = at;
  }
  pass(seconds: number): Date {
    this.#at = new Date(this.#at.getTime() + seconds * 1000);
    return this.#at;
  }
}

export interface Stage {
  readonly clock: DemoClock;
  readonly chance: Chance;
  /** Start of the event that is over, of the one to come, and the season's first day. */
  readonly lastEvent: Date;
  readonly nextEvent: Date;
  readonly seasonName: string;
  ports(): Ports;
  uuid(): string;
  actor(person: DemoPerson): Actor;
  learn(person: DemoPerson, actor: Actor): void;
}

/** A use case's value; a refusal while seeding is a defect of the demo. */
export const done = <T>(what: string, result: Result<T, Failure>): T => {
  if (result.ok) return result.value;
  const faults = (result.failure.faults ?? []).map((one) => `${one.pointer}: ${one.detail}`);
  throw new Error(`The demo could not ${what}: ${result.failure.detail} ${faults.join('; ')}`);
};

/** 18:00 by the zone's clocks on the Saturday that lies `from` to `from` + 6 days after `now`. */
const saturdayEvening = (now: Date, from: number): Date => {
  for (let days = from; ; days += 1) {
    const wall = wallTimeAt(ZONE, now.getTime() + days * DAY);
    if (new Date(Date.UTC(wall.year, wall.month - 1, wall.day)).getUTCDay() === 6) {
      return new Date(instantOf(ZONE, { ...wall, hour: 18, minute: 0, second: 0 }));
    }
  }
};

export const openStage = (app: Composition): Stage => {
  const now = app.ports().clock.now();
  const lastEvent = saturdayEvening(now, -9);
  const clock = new DemoClock(new Date(lastEvent.getTime() - 100 * DAY));
  const actors = new Map<string, Actor>();
  return {
    clock,
    chance: chanceFrom(SEED),
    lastEvent,
    nextEvent: saturdayEvening(now, 1),
    seasonName: String(wallTimeAt(ZONE, lastEvent.getTime()).year),
    ports: () => ({ ...app.ports(), clock }),
    uuid: () => app.ports().random.uuid(),
    actor: (person) => {
      const actor = actors.get(person.subject);
      if (actor === undefined) throw new Error(`${person.name} has not been added yet.`);
      // Each act of the demo is signed in afresh.
      return { ...actor, authenticatedAt: clock.now().toISOString() };
    },
    learn: (person, actor) => void actors.set(person.subject, actor),
  };
};
