import { createEvent } from '@/services/event/create-event';
import { enterCars } from '@/services/event/enter-cars';
import { pickCars } from '@/services/event/pick-cars';
import { saveGauge } from '@/services/gauge/save-gauge';
import type { DemoGauges } from '../make/measure';
import { CHIEF, COMPETITORS, type DemoCompetitor, OFFICIAL } from '../people';
import { done, type Stage, ZONE } from '../stage';
import { writeAnnouncement, writeDrawMade } from './write-draws';
import type { DemoClasses } from './write-rulebooks';

const HOUR = 3_600_000;

const day = (at: Date, days: number): string =>
  new Date(at.getTime() + days * 24 * HOUR).toISOString().slice(0, 10);

/** The series' gauges, in calibration but for one that is overdue. */
export const writeGauges = async (stage: Stage, seriesId: string): Promise<DemoGauges> => {
  const calibratedOn = day(stage.lastEvent, -130);
  const dueOn = day(stage.lastEvent, 235);
  const keep = async (
    code: string,
    description: Parameters<typeof saveGauge>[2]['description'],
  ) => {
    const id = stage.uuid();
    done(
      `enter gauge ${code}`,
      await saveGauge(stage.ports(), stage.actor(CHIEF), {
        act: stage.uuid(),
        seriesId,
        id,
        code,
        description,
        status: 'in-use',
        version: 0,
      }),
    );
    return id;
  };
  const inch = (text: string) => ({ text, unit: 'in' });
  const certificate = (number: string, u: string) => ({
    number,
    expandedUncertainty: inch(u),
    coverageFactor: '2',
  });
  const micrometer = await keep('MIC-014', {
    kind: 'micrometer',
    name: 'Micrometer, 0–1 in',
    division: inch('0.0001'),
    range: { from: inch('0'), to: inch('1') },
    certificate: certificate('C-7719', '0.00005'),
    calibratedOn,
    dueOn,
  });
  const boreGauge = await keep('DB-07', {
    kind: 'dial-bore-gauge',
    name: 'Dial bore gauge, 0.8–1.0 in',
    division: inch('0.0001'),
    range: { from: inch('0.8'), to: inch('1') },
    largerReads: 'plus',
    certificate: certificate('C-7741', '0.00005'),
    calibratedOn,
    dueOn,
  });
  const ring = await keep('SR-03', {
    kind: 'setting-ring',
    name: 'Setting ring 0.8440 in',
    size: inch('0.8440'),
    certificate: certificate('C-7702', '0.00002'),
    calibratedOn,
    dueOn,
  });
  const insideMicrometer = await keep('IM-02', {
    kind: 'micrometer',
    name: 'Inside micrometer, 2–6 in',
    division: inch('0.0005'),
    range: { from: inch('2'), to: inch('6') },
    certificate: certificate('C-7760', '0.0004'),
    calibratedOn,
    dueOn,
  });
  await keep('CAL-01', {
    kind: 'caliper',
    name: 'Caliper, 0–6 in',
    division: inch('0.001'),
    range: { from: inch('0'), to: inch('6') },
    calibratedOn: day(stage.lastEvent, -500),
    dueOn: day(stage.lastEvent, -135),
  });
  return { micrometer, boreGauge, ring, insideMicrometer };
};

export interface PickedCar {
  readonly competitor: DemoCompetitor;
  readonly inspectionId: string;
}

const enter = async (
  stage: Stage,
  seriesId: string,
  classes: DemoClasses,
  event: { readonly slug: string; readonly startsAt: Date; readonly positions: boolean },
) => {
  const eventId = stage.uuid();
  const official = () => stage.actor(OFFICIAL);
  done(
    'open the event',
    await createEvent(stage.ports(), official(), {
      act: stage.uuid(),
      seriesId,
      id: eventId,
      seasonId: classes.seasonId,
      slug: event.slug,
      name: event.slug === 'round-1' ? 'Quarrel Fen Opener' : 'Tallow Mere Evening',
      track: event.slug === 'round-1' ? 'Quarrel Fen Oval' : 'Tallow Mere Speedway',
      zone: ZONE,
      startsAt: event.startsAt.toISOString(),
      endsAt: new Date(event.startsAt.getTime() + 5 * HOUR).toISOString(),
      protestMinutes: 4320,
    }),
  );
  const entries = COMPETITORS.map((competitor) => ({
    competitor,
    row: {
      id: stage.uuid(),
      classId: competitor.className === 'Street Eight' ? classes.streetEight : classes.modifiedFour,
      carNumber: competitor.carNumber,
      competitorName: competitor.person.name,
      competitorEmail: competitor.person.email,
      engineReference: competitor.engine,
      position: event.positions ? competitor.position : null,
    },
  }));
  done(
    'enter the cars',
    await enterCars(stage.ports(), official(), {
      act: stage.uuid(),
      seriesId,
      eventId,
      entries: entries.map(({ row }) => row),
    }),
  );
  return { eventId, entries };
};

/** The event that is over, with its picks, and the one to come. */
export const writeEvents = async (
  stage: Stage,
  seriesId: string,
  classes: DemoClasses,
): Promise<readonly PickedCar[]> => {
  stage.clock.set(new Date(stage.lastEvent.getTime() - 4 * HOUR));
  const { eventId, entries } = await enter(stage, seriesId, classes, {
    slug: 'round-1',
    startsAt: stage.lastEvent,
    positions: true,
  });
  const next = await enter(stage, seriesId, classes, {
    slug: 'round-2',
    startsAt: stage.nextEvent,
    positions: false,
  });
  const drawn = { seriesId, eventId, classId: classes.modifiedFour };
  const drawId = await writeAnnouncement(stage, drawn, stage.lastEvent);
  const toCome = { seriesId, eventId: next.eventId, classId: classes.streetEight };
  await writeAnnouncement(stage, toCome, stage.nextEvent);
  stage.clock.set(new Date(stage.lastEvent.getTime() + 3 * HOUR));
  await writeDrawMade(stage, seriesId, drawId);
  const picked = entries.filter(({ competitor }) =>
    ['12J', '408', '88', '7', '31'].includes(competitor.carNumber),
  );
  const picks = picked.map(({ competitor, row }) => ({
    competitor,
    pick: {
      inspectionId: stage.uuid(),
      entryId: row.id,
      because: competitor.position <= 2 ? ('position' as const) : ('nominated' as const),
      words:
        competitor.position <= 2
          ? `Finished ${competitor.position}`
          : 'New engine since its paperwork was accepted',
    },
  }));
  done(
    'pick the cars',
    await pickCars(stage.ports(), stage.actor(OFFICIAL), {
      act: stage.uuid(),
      seriesId,
      eventId,
      picks: picks.map(({ pick }) => pick),
    }),
  );
  return picks.map(({ competitor, pick }) => ({ competitor, inspectionId: pick.inspectionId }));
};
