import type { DecisionDraft } from '@/domain/verdict/decision';
import { publishVerdict } from '@/services/verdict/publish-verdict';
import { saveVerdictDraft } from '@/services/verdict/save-verdict-draft';
import { OFFICIAL } from '../people';
import { done, type Stage } from '../stage';

/** An official's decision, written down and published. */
export const writeVerdict = async (
  stage: Stage,
  seriesId: string,
  inspectionId: string,
  decision: Partial<DecisionDraft> & Pick<DecisionDraft, 'decision' | 'reasons'>,
): Promise<void> => {
  const content: DecisionDraft = {
    reportRevision: 1,
    clauses: [],
    penalty: null,
    moneyMinor: null,
    againstComputedBecause: '',
    ...decision,
  };
  const draft = done(
    'write the decision down',
    await saveVerdictDraft(stage.ports(), stage.actor(OFFICIAL), {
      act: stage.uuid(),
      seriesId,
      inspectionId,
      version: null,
      content,
    }),
  );
  stage.clock.pass(900);
  done(
    'publish the verdict',
    await publishVerdict(stage.ports(), stage.actor(OFFICIAL), {
      act: stage.uuid(),
      seriesId,
      inspectionId,
      version: draft.version,
    }),
  );
};
