import { useMutation } from '@tanstack/react-query';
import { useCallback, useEffect, useRef, useState } from 'react';
import { uuidV7 } from '@/components/measuring/queue/uuid-v7';
import { type DraftSent, type NewerDraft, putDraft, type Saved } from './put-draft';

/** A draft as it stands on the screen. */
export interface Unsent {
  readonly kind: 'edition' | 'bulletin';
  readonly title: string;
  readonly content: unknown;
}

export type SaveState =
  | { readonly kind: 'kept'; readonly at: string }
  | { readonly kind: 'changed' }
  | { readonly kind: 'waiting' }
  | { readonly kind: 'newer'; readonly newer: NewerDraft }
  | { readonly kind: 'refused'; readonly detail: string };

const PAUSE = 700;

interface Sending {
  readonly version: number;
  readonly draft: DraftSent;
  readonly of: Unsent;
}

/**
 * Keeps a draft on the server as it is written: one sending at a time, a moment after the last
 * change, each with the version it grew from. Stops when somebody else's version is newer, until
 * `goOnFrom` says what to go on with.
 */
export const useAutosave = (
  draftId: string,
  start: { readonly version: number; readonly savedAt: string },
  draft: Unsent,
) => {
  const [state, setState] = useState<SaveState>({ kind: 'kept', at: start.savedAt });
  const version = useRef(start.version);
  const kept = useRef<Unsent>(draft);
  const latest = useRef<Unsent>(draft);
  latest.current = draft;

  const { mutate, isPending, isPaused, failureCount } = useMutation({
    mutationFn: (sending: Sending): Promise<Saved> =>
      putDraft(draftId, sending.version, sending.draft),
    retry: true,
    retryDelay: (attempt) => Math.min(1000 * 2 ** attempt, 15_000),
    onSuccess: (answer, sending) => {
      if (answer.outcome === 'newer') return setState({ kind: 'newer', newer: answer.newer });
      if (answer.outcome === 'refused') {
        return setState({ kind: 'refused', detail: answer.detail });
      }
      version.current = answer.version;
      kept.current = sending.of;
      setState(
        latest.current === sending.of ? { kind: 'kept', at: answer.savedAt } : { kind: 'changed' },
      );
    },
  });

  useEffect(() => {
    if (draft === kept.current || isPending || state.kind === 'newer') return undefined;
    const timer = setTimeout(() => {
      const act = uuidV7();
      setState({ kind: 'changed' });
      mutate({
        version: version.current,
        draft: { ...draft, act } as DraftSent,
        of: draft,
      });
    }, PAUSE);
    return () => clearTimeout(timer);
  }, [draft, isPending, state.kind, mutate]);

  const unsent = draft !== kept.current || isPending;
  useEffect(() => {
    if (!unsent) return undefined;
    const ask = (event: BeforeUnloadEvent) => event.preventDefault();
    addEventListener('beforeunload', ask);
    return () => removeEventListener('beforeunload', ask);
  }, [unsent]);

  /** Goes on from the newer version; what is on the screen is sent next, if it differs. */
  const goOnFrom = useCallback((newer: NewerDraft) => {
    version.current = newer.version;
    kept.current = { kind: newer.kind, title: newer.title, content: newer.content };
    setState({ kind: 'changed' });
  }, []);

  const waiting = isPending && (isPaused || failureCount > 0);
  const shown: SaveState = waiting
    ? { kind: 'waiting' }
    : state.kind === 'kept' && unsent
      ? { kind: 'changed' }
      : state;
  return { state: shown, base: kept.current, version: version.current, unsent, goOnFrom };
};
