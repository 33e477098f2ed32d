import { readBulletinContent, readRulebookContent } from '@/contracts/rulebook/read-rulebook';
import { type Actor, may } from '@/domain/access/permission';
import { absent, type Failure } from '@/domain/failure';
import { fail, ok, type Result } from '@/domain/result';
import { performAct } from '../../act/perform-act';
import type { Ports } from '../../ports';
import { lockDraft } from './lock-draft';

const READ = { edition: readRulebookContent, bulletin: readBulletinContent } as const;

/**
 * Keeps a draft as it is now, unfinished or not. Refused as stale when somebody saved it after the
 * version given: nobody overwrites another unseen.
 */
export const saveDraft = async (
  deps: Pick<Ports, 'db' | 'clock' | 'random' | 'jobs'>,
  actor: Actor,
  input: {
    readonly act: string;
    readonly seriesId: string;
    readonly draftId: string;
    readonly kind: 'edition' | 'bulletin';
    /** The version that the change grew from. */
    readonly version: number;
    readonly title: string;
    readonly content: unknown;
  },
): Promise<Result<{ readonly version: number; readonly savedAt: string }, Failure>> => {
  if (!may(actor, 'rulebook.write', input.seriesId)) return fail(absent());
  const { act: id, seriesId, draftId, kind, version, title } = input;
  const content = READ[kind](input.content);
  if (!content.ok) return content;
  return performAct(
    deps,
    actor,
    {
      id,
      kind: 'save-draft',
      seriesId,
      input: { draftId, version, title, content: content.value },
    },
    async ({ em, at }) => {
      const found = await lockDraft(em, { seriesId, id: draftId, kind }, version);
      if (!found.ok) return found;
      const draft = found.value;
      draft.title = title;
      draft.content = content.value as unknown as Record<string, unknown>;
      draft.updatedBy = actor.personId;
      draft.updatedAt = at;
      await em.flush();
      return ok({ version: draft.version, savedAt: at.toISOString() });
    },
  );
};
