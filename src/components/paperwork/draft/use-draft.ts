import { useMutation } from '@tanstack/react-query';
import { useCallback, useEffect, useRef, useState } from 'react';
import type { SaveDraftResponse } from '@/contracts/paperwork/paperwork';
import type { PaperworkDraft } from '@/domain/paperwork/draft';
import { newId, post, Refusal } from '../api';
import { findLocalDraft, keepLocalDraft, type LocalDraft } from './local-draft';

const PAUSE = 900;
const RETRY = 10_000;

export interface Saved {
  readonly state: 'device' | 'sent' | 'failed';
  readonly at: string;
  readonly words?: string | undefined;
}

interface Start {
  readonly paperworkId: string;
  readonly version: number;
  readonly draft: PaperworkDraft;
  readonly updatedAt: string;
}

/**
 * A draft that saves itself: at once on this device, then on the server after a pause. Without a
 * connection it is tried again; a newer draft from another device is shown, never overwritten.
 */
export const useDraft = (start: Start) => {
  const { paperworkId } = start;
  const [draft, setDraft] = useState(start.draft);
  const [saved, setSaved] = useState<Saved>({ state: 'sent', at: start.updatedAt });
  const [older, setOlder] = useState<LocalDraft>();
  const [conflict, setConflict] = useState(false);
  const version = useRef(start.version);
  const latest = useRef(start.draft);
  const dirty = useRef(false);
  const busy = useRef(false);
  const timer = useRef<ReturnType<typeof setTimeout>>(undefined);

  const { mutateAsync } = useMutation({
    networkMode: 'always',
    mutationFn: (body: { act: string; version: number; draft: PaperworkDraft }) =>
      post<SaveDraftResponse>(`/api/paperwork/${paperworkId}/draft`, body),
  });

  const send = useCallback(async (): Promise<void> => {
    clearTimeout(timer.current);
    if (busy.current || !dirty.current) return;
    busy.current = true;
    dirty.current = false;
    const sending = latest.current;
    const local = { paperworkId, draft: sending };
    try {
      const body = { act: newId(), version: version.current, draft: sending };
      const answer = await mutateAsync(body);
      version.current = answer.version;
      const isLatest = latest.current === sending;
      if (isLatest) {
        await keepLocalDraft({ ...local, version: answer.version, sent: true, at: answer.savedAt });
        setSaved({ state: 'sent', at: answer.savedAt });
      }
    } catch (error) {
      dirty.current = true;
      const refused = error instanceof Refusal && error.status < 500;
      if (error instanceof Refusal && error.problem === 'stale') setConflict(true);
      setSaved((before) => ({
        ...before,
        state: before.state === 'failed' ? 'failed' : 'device',
        words: refused ? error.detail : 'Not sent yet: no connection',
      }));
      if (!refused) timer.current = setTimeout(() => void send(), RETRY);
    } finally {
      busy.current = false;
    }
    if (dirty.current && latest.current !== sending) void send();
  }, [mutateAsync, paperworkId]);

  const change = useCallback(
    (make: (before: PaperworkDraft) => PaperworkDraft) => {
      const next = make(latest.current);
      latest.current = next;
      dirty.current = true;
      setDraft(next);
      const at = new Date().toISOString();
      keepLocalDraft({ paperworkId, draft: next, version: version.current, sent: false, at }).then(
        () => setSaved((before) => ({ ...before, state: 'device', at })),
        () => setSaved({ state: 'failed', at, words: 'This device keeps nothing' }),
      );
      clearTimeout(timer.current);
      timer.current = setTimeout(() => void send(), PAUSE);
    },
    [paperworkId, send],
  );

  useEffect(() => {
    const now = () => void send();
    addEventListener('online', now);
    document.addEventListener('visibilitychange', now);
    findLocalDraft(paperworkId).then(
      (local) => {
        if (local === undefined || local.sent) return;
        // Written here and never acknowledged: taken up where nothing newer came in between.
        if (local.version === version.current) change(() => local.draft);
        else setOlder(local);
      },
      () => undefined,
    );
    return () => {
      removeEventListener('online', now);
      document.removeEventListener('visibilitychange', now);
      clearTimeout(timer.current);
    };
  }, [paperworkId, change, send]);

  const takeOlder = () => {
    if (older !== undefined) change(() => older.draft);
    setOlder(undefined);
  };

  return {
    draft,
    change,
    saved,
    send,
    older,
    takeOlder,
    dropOlder: () => setOlder(undefined),
    conflict,
  };
};
