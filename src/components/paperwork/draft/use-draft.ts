import { useMutation } from '@tanstack/react-query';
import { useCallback, useEffect, useRef, useState } from 'react';
import type { OpenDraftResponse, SaveDraftResponse } from '@/contracts/paperwork/paperwork';
import type { PaperworkDraft } from '@/domain/paperwork/draft';
import { draftConflicts, mergeDrafts, type Side } from '@/domain/paperwork/merge/merge-drafts';
import { get, newId, post, Refusal } from '../api';
import { findLocalDraft, keepLocalDraft } from './local-draft';

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

/** Two drafts that must become one: what is written here, and a newer one from another device. */
export interface Overtaken {
  readonly base: PaperworkDraft | undefined;
  readonly mine: PaperworkDraft;
  readonly theirs: PaperworkDraft;
  readonly version: number;
}

/**
 * A draft that saves itself: at once on this device, then on the server after a pause. Without a
 * connection it is tried again. Where another device was faster, what only one of them changed is taken
 * from each, and the person chooses field by field where both did; nothing is overwritten unseen.
 */
export const useDraft = (start: Start) => {
  const { paperworkId } = start;
  const [draft, setDraft] = useState(start.draft);
  const [saved, setSaved] = useState<Saved>({ state: 'sent', at: start.updatedAt });
  const [overtaken, setOvertaken] = useState<Overtaken>();
  const [joined, setJoined] = useState(false);
  const version = useRef(start.version);
  const base = useRef(start.draft);
  const latest = useRef(start.draft);
  const dirty = useRef(false);
  const busy = useRef(false);
  const timer = useRef<ReturnType<typeof setTimeout>>(undefined);
  const join = useRef<(two: Overtaken) => void>(() => undefined);

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
    try {
      const body = { act: newId(), version: version.current, draft: sending };
      const answer = await mutateAsync(body);
      version.current = answer.version;
      base.current = sending;
      if (latest.current === sending) {
        const local = { paperworkId, draft: sending, version: answer.version, sent: true };
        await keepLocalDraft({ ...local, at: answer.savedAt });
        setSaved({ state: 'sent', at: answer.savedAt });
      }
    } catch (error) {
      dirty.current = true;
      const stale = error instanceof Refusal && error.problem === 'stale';
      const refused = error instanceof Refusal && error.status < 500;
      setSaved((before) => ({
        ...before,
        state: before.state === 'failed' ? 'failed' : 'device',
        words: stale
          ? 'Changed on another device'
          : refused
            ? error.detail
            : 'Not sent yet: no connection',
      }));
      if (stale) {
        get<OpenDraftResponse>(`/api/paperwork/${paperworkId}/draft`).then(
          (newer) =>
            join.current({
              base: base.current,
              mine: latest.current,
              theirs: newer.draft,
              version: newer.version,
            }),
          () => {
            timer.current = setTimeout(() => void send(), RETRY);
          },
        );
      } else if (!refused) timer.current = setTimeout(() => void send(), RETRY);
      return;
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
      const local = { paperworkId, draft: next, version: version.current, base: base.current };
      keepLocalDraft({ ...local, sent: false, at }).then(
        () => setSaved((before) => ({ ...before, state: 'device', at })),
        () => setSaved({ state: 'failed', at, words: 'This device keeps nothing' }),
      );
      clearTimeout(timer.current);
      timer.current = setTimeout(() => void send(), PAUSE);
    },
    [paperworkId, send],
  );

  /** Goes on with one draft out of two, on top of the newer version. */
  const settle = useCallback(
    (two: Overtaken, chosen: ReadonlyMap<string, Side>) => {
      version.current = two.version;
      base.current = two.theirs;
      setOvertaken(undefined);
      setJoined(true);
      change((mine) => mergeDrafts(two.base, mine, two.theirs, chosen));
    },
    [change],
  );
  join.current = (two) =>
    draftConflicts(two.base, two.mine, two.theirs).length === 0
      ? settle(two, new Map())
      : setOvertaken(two);

  useEffect(() => {
    const now = () => void send();
    addEventListener('online', now);
    document.addEventListener('visibilitychange', now);
    findLocalDraft(paperworkId).then(
      (local) => {
        if (local === undefined || local.sent) return;
        // Written here and never acknowledged: taken up where nothing newer came in between.
        if (local.version === version.current) return change(() => local.draft);
        latest.current = local.draft;
        setDraft(local.draft);
        const { base: began, draft: mine } = local;
        join.current({ base: began, mine, theirs: start.draft, version: start.version });
      },
      () => undefined,
    );
    return () => {
      removeEventListener('online', now);
      document.removeEventListener('visibilitychange', now);
      clearTimeout(timer.current);
    };
  }, [paperworkId, change, send, start.draft, start.version]);

  return { draft, change, saved, send, overtaken, settle, joined };
};
