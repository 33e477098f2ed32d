import type { Clause } from '@/domain/rulebook/clause';
import { TAPPET_RULE_SET } from '@/domain/rulebook/rule-sets/tappet';
import { publishBulletin } from '@/services/rulebook/bulletin/publish-bulletin';
import { openBulletin } from '@/services/rulebook/draft/open-bulletin';
import { publishClarification } from '@/services/rulebook/ruling/publish-clarification';
import { OFFICIAL } from '../people';
import { done, type Stage } from '../stage';

const foot = (): Clause => {
  const clause = TAPPET_RULE_SET.clauses.find(({ number }) => number === '4.3');
  if (clause === undefined) throw new Error('The tappet rule set has no clause 4.3.');
  return {
    ...clause,
    words:
      'The foot of a lifter, at its largest diameter, is not larger than its body, at its widest, by more than 0.0010 in.',
  };
};

/** A bulletin that says more exactly where the foot is measured, and a clarification. */
export const writeBulletins = async (
  stage: Stage,
  seriesId: string,
  classId: string,
): Promise<void> => {
  const official = () => stage.actor(OFFICIAL);
  const draftId = stage.uuid();
  done(
    'draft the bulletin',
    await openBulletin(stage.ports(), official(), {
      act: stage.uuid(),
      seriesId,
      id: draftId,
      classId,
      content: {
        title: 'Foot over body: where it is measured',
        reason: 'Two engines were measured at different places last season.',
        changes: [{ kind: 'replace', clause: JSON.parse(JSON.stringify(foot())) }],
        effective: { kind: 'next-event' },
      },
    }),
  );
  stage.clock.pass(1800);
  done(
    'publish the bulletin',
    await publishBulletin(stage.ports(), official(), {
      act: stage.uuid(),
      seriesId,
      draftId,
      version: 1,
    }),
  );
  stage.clock.pass(86_400);
  done(
    'publish the clarification',
    await publishClarification(stage.ports(), official(), {
      act: stage.uuid(),
      seriesId,
      id: stage.uuid(),
      classId,
      clause: '4.4',
      question: 'Does one bushed bore count, if it was bushed back to the stock size?',
      answer: 'Yes. A bushed bore is a bushed bore, whatever its size.',
    }),
  );
};
