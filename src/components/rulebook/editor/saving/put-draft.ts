import type * as z from 'zod/mini';
import type { draftAnswer, draftRequest } from '@/contracts/rulebook/drafts';

export type DraftSent = z.output<typeof draftRequest>;
export type NewerDraft = z.output<typeof draftAnswer>;

export type Saved =
  | { readonly outcome: 'saved'; readonly version: number; readonly savedAt: string }
  | { readonly outcome: 'newer'; readonly newer: NewerDraft }
  /** It will not be taken however often it is sent. */
  | { readonly outcome: 'refused'; readonly detail: string };

interface Problem {
  readonly detail?: string;
  readonly newer?: NewerDraft;
}

/** Sends a whole draft with the version it grew from. Throws when there is no answer, to be tried again. */
export const putDraft = async (
  draftId: string,
  version: number,
  draft: DraftSent,
): Promise<Saved> => {
  const response = await fetch(`/api/rulebooks/drafts/${draftId}`, {
    method: 'PUT',
    headers: { 'content-type': 'application/json', 'if-match': `"${version}"` },
    body: JSON.stringify(draft),
  });
  if (response.status >= 500) throw new Error(`answer ${response.status}`);
  if (response.ok) {
    const saved = (await response.json()) as { version: number; savedAt: string };
    return { outcome: 'saved', ...saved };
  }
  const problem = (await response.json().catch(() => ({}))) as Problem;
  if (response.status === 412 && problem.newer !== undefined) {
    return { outcome: 'newer', newer: problem.newer };
  }
  return { outcome: 'refused', detail: problem.detail ?? 'The draft was not kept.' };
};
