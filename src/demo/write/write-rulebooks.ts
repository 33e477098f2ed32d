import type { Clause } from '@/domain/rulebook/clause';
import { TAPPET_RULE_SET } from '@/domain/rulebook/rule-sets/tappet';
import { openDraft } from '@/services/rulebook/open-draft';
import { publishEdition } from '@/services/rulebook/publish-edition';
import { addClass } from '@/services/series/add-class';
import { openSeason } from '@/services/series/open-season';
import { OFFICIAL } from '../people';
import { done, type Stage } from '../stage';
import { writeBulletins } from './write-bulletins';

export interface DemoClasses {
  readonly seasonId: string;
  readonly streetEight: string;
  readonly modifiedFour: string;
}

/** The four-cylinder class runs a smaller engine; what else differs stands in its own rulebook. */
const forFour = (clause: Clause): Clause =>
  clause.number === '3.1' && clause.requirement?.kind === 'limit'
    ? {
        ...clause,
        words: 'Displacement, from the measured bores and stroke, is at most 140.0 cubic inches.',
        requirement: { ...clause.requirement, max: { text: '140.0', unit: 'in³' } },
      }
    : clause;

const PHOTOGRAPHS: readonly Clause[] = [
  {
    number: '5.3',
    heading: 'Photograph of the block casting number',
    words: 'A photograph shows the casting number on the block and the car number.',
    force: 'mandatory',
    penaltyRow: 'B',
    requirement: {
      kind: 'photograph',
      subject: 'block-casting',
      visible: ['the block casting number', 'the car number'],
    },
  },
];

/** The season, its two classes, and an edition of each in force before the first demo event. */
export const writeRulebooks = async (stage: Stage, seriesId: string): Promise<DemoClasses> => {
  const official = () => stage.actor(OFFICIAL);
  const season = done(
    'open the season',
    await openSeason(stage.ports(), official(), {
      act: stage.uuid(),
      seriesId,
      id: stage.uuid(),
      name: stage.seasonName,
      startsOn: `${stage.seasonName}-01-01`,
      endsOn: `${stage.seasonName}-12-31`,
    }),
  );
  const write = async (name: string, clauses: readonly Clause[]): Promise<string> => {
    const { classId } = done(
      `add ${name}`,
      await addClass(stage.ports(), official(), {
        act: stage.uuid(),
        seriesId,
        id: stage.uuid(),
        seasonId: season.seasonId,
        name,
      }),
    );
    const draftId = stage.uuid();
    const content = {
      clauses: [...clauses, ...PHOTOGRAPHS],
      penalties: [...TAPPET_RULE_SET.penalties],
    };
    done(
      `draft the rulebook of ${name}`,
      await openDraft(stage.ports(), official(), {
        act: stage.uuid(),
        seriesId,
        id: draftId,
        classId,
        title: `First edition of season ${stage.seasonName}`,
        content: JSON.parse(JSON.stringify(content)),
      }),
    );
    stage.clock.pass(3600);
    done(
      `publish the rulebook of ${name}`,
      await publishEdition(stage.ports(), official(), {
        act: stage.uuid(),
        seriesId,
        draftId,
        version: 1,
        inForceAt: null,
      }),
    );
    return classId;
  };
  const streetEight = await write('Street Eight', TAPPET_RULE_SET.clauses);
  const modifiedFour = await write('Modified Four', TAPPET_RULE_SET.clauses.map(forFour));
  await writeBulletins(stage, seriesId, streetEight);
  return { seasonId: season.seasonId, streetEight, modifiedFour };
};
