import type { EntityManager } from '@mikro-orm/postgresql';
import { LockMode } from '@mikro-orm/postgresql';
import { type EngineFacts, withCorrectedFacts } from '@/domain/paddock/engine-facts';
import type { PaperworkDraft } from '@/domain/paperwork/draft';
import { Paperwork } from '@/entities/paperwork/paperwork';

/** Takes a correction over into paperwork that is still written, where it said what was wrong. */
export const correctDrafts = async (
  em: EntityManager,
  change: {
    readonly engineId: string;
    readonly competitorId: string;
    readonly before: EngineFacts;
    readonly now: EngineFacts;
  },
): Promise<void> => {
  const { engineId, competitorId, before, now } = change;
  const open = await em.find(
    Paperwork,
    { engineId, competitorId, state: { $in: ['draft', 'returned'] } },
    { lockMode: LockMode.PESSIMISTIC_WRITE, orderBy: { id: 'asc' } },
  );
  for (const paperwork of open) {
    const draft = paperwork.draft as unknown as PaperworkDraft;
    const corrected = withCorrectedFacts(draft, before, now);
    if (corrected !== draft) paperwork.draft = corrected as unknown as Record<string, unknown>;
  }
};
