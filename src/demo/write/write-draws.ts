import { announceDraw } from '@/services/draw/announce-draw';
import { findClassDraw } from '@/services/draw/find-class-draw';
import { publishDraw } from '@/services/draw/publish-draw';
import { OFFICIAL } from '../people';
import { done, type Stage } from '../stage';

const VALUES = [
  {
    name: 'Two dice, thrown three times by a competitor at the drivers’ meeting: the sum of each throw',
    ifMissing: 'void' as const,
    substitute: '',
  },
  {
    name: 'Laps completed by each car in the feature, as the scorer reads them out',
    ifMissing: 'left-out' as const,
    substitute: '',
  },
];

interface DemoDraw {
  readonly seriesId: string;
  readonly eventId: string;
  readonly classId: string;
}

/** Announces the draw of one car of a class before the session. Gives the draw's id. */
export const writeAnnouncement = async (
  stage: Stage,
  { seriesId, ...of }: DemoDraw,
  sessionAt: Date,
): Promise<string> => {
  const official = stage.actor(OFFICIAL);
  const found = await findClassDraw(stage.ports(), official, of);
  const announced = await announceDraw(stage.ports(), official, {
    act: stage.uuid(),
    id: stage.uuid(),
    seriesId,
    ...of,
    poolHash: found?.now.hash ?? '',
    select: 1,
    sessionAt: sessionAt.toISOString(),
    values: VALUES,
  });
  return done('announce a draw', announced).id;
};

/** Makes a draw that was announced. Which car comes out is chance, here too. */
export const writeDrawMade = async (
  stage: Stage,
  seriesId: string,
  drawId: string,
): Promise<void> => {
  const numbers = [
    ['7', '11', '4'],
    ['25', '25', '24', '25', '19', '3'],
  ];
  const made = await publishDraw(stage.ports(), stage.actor(OFFICIAL), {
    act: stage.uuid(),
    seriesId,
    drawId,
    values: VALUES.map(({ name }, i) => ({
      name,
      source: 'announced' as const,
      numbers: numbers[i] ?? [],
    })),
  });
  done('make a draw', made);
};
