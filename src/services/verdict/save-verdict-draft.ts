import { LockMode } from '@mikro-orm/core';
import { type Actor, may } from '@/domain/access/permission';
import { absent, type Failure, stale } from '@/domain/failure';
import { fail, ok, type Result } from '@/domain/result';
import type { DecisionDraft } from '@/domain/verdict/decision';
import { VerdictDraft } from '@/entities/event/verdict-draft';
import { performAct } from '../act/perform-act';
import type { Ports } from '../ports';
import { findCase } from './find-case';
import { refusal } from './refusal';

/**
 * Writes down a decision; it may be unfinished. `version` is that of the draft which was opened,
 * `null` where there was none. A corrected report opens a published one anew.
 */
export const saveVerdictDraft = async (
  deps: Pick<Ports, 'db' | 'clock' | 'random' | 'jobs'>,
  actor: Actor,
  input: {
    readonly act: string;
    readonly seriesId: string;
    readonly inspectionId: string;
    readonly version: number | null;
    readonly content: DecisionDraft;
  },
): Promise<Result<{ readonly version: number }, Failure>> => {
  const { act, seriesId, inspectionId, version, content } = input;
  if (!may(actor, 'verdict.decide', seriesId)) return fail(absent());
  return performAct(
    deps,
    actor,
    { id: act, kind: 'save-verdict-draft', seriesId, input: { inspectionId, version, content } },
    async ({ em, at }) => {
      const found = await findCase(em, seriesId, inspectionId);
      if (found === undefined) return fail(absent());
      const refused = refusal(found, actor.personId);
      if (refused !== undefined) return fail(refused);
      const draft = await em.findOne(
        VerdictDraft,
        { seriesId, inspectionId },
        { lockMode: LockMode.PESSIMISTIC_WRITE },
      );
      if ((draft?.version ?? null) !== version) return fail(stale());
      const kept = content as unknown as Record<string, unknown>;
      const changed = { content: kept, updatedBy: actor.personId, updatedAt: at };
      if (draft === null) {
        const id = deps.random.uuid();
        em.persist(
          em.create(VerdictDraft, {
            seriesId,
            id,
            inspectionId,
            ...changed,
            version: 1,
            publishedAt: null,
          }),
        );
        await em.flush();
        return ok({ version: 1 });
      }
      em.assign(draft, { ...changed, publishedAt: null });
      await em.flush();
      return ok({ version: draft.version });
    },
  );
};
