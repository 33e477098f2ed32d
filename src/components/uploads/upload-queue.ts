import { uuidV7 } from '../measuring/queue/uuid-v7';
import { postJson, putBytes } from './network';
import { type SendDeps, sendUpload } from './send-upload';
import { arrivedShare, isStale, pathOf, renewed, type Upload, type UploadAnswer } from './upload';
import { changeUpload, forgetUpload, keepUpload, readBytes, readUploads } from './upload-store';

/** Where an upload stands, as it is shown. */
export interface QueuedUpload {
  readonly upload: Upload;
  readonly phase: 'waiting' | 'sending' | 'paused' | 'no-signal' | 'sign-in' | 'refused';
  /** 0 to 1; 1 while the server reads it back. */
  readonly share: number;
  /** Whether the device holds it; otherwise this page alone does. */
  readonly kept: boolean;
  /** Why it was refused. */
  readonly detail?: string | undefined;
}

export interface UploadQueue {
  readonly add: (upload: Upload, file: Blob) => Promise<void>;
  readonly pause: (id: string) => void;
  readonly goOn: (id: string) => void;
  /** Sent no more, and forgotten. */
  readonly drop: (id: string) => void;
  readonly stop: () => void;
}

interface Hearer {
  readonly changed: (uploads: readonly QueuedUpload[]) => void;
  readonly answered: (upload: Upload, answer: UploadAnswer, bytes: Blob) => void;
}

const AT_ONCE = 2;
const SHORTEST_MS = 2_000;
const LONGEST_MS = 30_000;

/**
 * Sends the uploads of one group, a few at a time, while the page lives: those the device still holds
 * from before, and those that are added. A lost connection is tried again by itself, soon and then
 * less often, and at once when the network or the reader comes back. One tab at a time sends a file.
 */
export const openUploadQueue = (
  group: string,
  hearer: Hearer,
  network: Pick<SendDeps, 'post' | 'put'> = { post: postJson, put: putBytes },
): UploadQueue => {
  const queued = new Map<string, QueuedUpload>();
  const loose = new Map<string, Blob>();
  const running = new Map<string, AbortController>();
  let stopped = false;
  let timer = 0;
  let delay = SHORTEST_MS;
  /** Whether the last sending got an answer. */
  let reached = true;

  const tell = () => !stopped && hearer.changed([...queued.values()]);
  const set = (id: string, change: Partial<QueuedUpload>) => {
    const before = queued.get(id);
    if (before === undefined) return;
    queued.set(id, { ...before, ...change });
    tell();
  };
  const change = async (id: string, with_: Partial<Upload>) => {
    const before = queued.get(id);
    if (before === undefined) return;
    queued.set(id, { ...before, upload: { ...before.upload, ...with_ } });
    if (before.kept) await changeUpload(id, with_);
  };
  const forget = async (id: string) => {
    queued.delete(id);
    loose.delete(id);
    tell();
    await forgetUpload(id);
  };

  const bytesOf = async ({ id, type }: Upload): Promise<Blob | undefined> => {
    const held = loose.get(id);
    if (held !== undefined) return held;
    const bytes = await readBytes(id);
    return bytes && new Blob([bytes], { type });
  };

  const add = async (upload: Upload, file: Blob): Promise<void> => {
    let kept = true;
    try {
      await keepUpload(upload, await file.arrayBuffer());
    } catch {
      kept = false;
      loose.set(upload.id, file);
    }
    queued.set(upload.id, { upload, phase: 'waiting', share: 0, kept });
    tell();
    work(true);
  };

  const send = async (id: string, signal: AbortSignal): Promise<void> => {
    const one = queued.get(id);
    const bytes = one && (await bytesOf(one.upload));
    if (one === undefined) return;
    if (bytes === undefined) return forget(id);
    if (isStale(one.upload, Date.now())) {
      if (!one.upload.named) await forget(id);
      return add({ ...renewed(one.upload, uuidV7), paused: false }, bytes);
    }
    set(id, { phase: 'sending' });
    const deps: SendDeps = {
      ...network,
      keep: (with_) => change(id, with_),
      now: () => Date.now(),
    };
    const outcome = await sendUpload(one.upload, bytes, deps, signal, (share) =>
      set(id, { share }),
    );
    if (!queued.has(id) || outcome.kind === 'stopped') return;
    reached = outcome.kind === 'answered' || outcome.kind === 'refused';
    if (reached) delay = SHORTEST_MS;
    if (outcome.kind === 'answered') {
      if (!stopped) hearer.answered(one.upload, outcome.answer, bytes);
      return forget(id);
    }
    if (outcome.kind === 'refused') return set(id, { phase: 'refused', detail: outcome.detail });
    set(id, { phase: outcome.kind });
    later();
  };

  const later = () => {
    if (timer !== 0 || stopped) return;
    timer = window.setTimeout(() => {
      timer = 0;
      work();
    }, delay);
    delay = Math.min(LONGEST_MS, delay * 2);
  };

  const run = async (id: string) => {
    const stop = new AbortController();
    running.set(id, stop);
    try {
      await navigator.locks.request(`tagwire-upload-${id}`, { ifAvailable: true }, (lock) =>
        lock === null ? later() : send(id, stop.signal),
      );
    } catch {
      reached = false;
      set(id, { phase: 'no-signal' });
      later();
    } finally {
      running.delete(id);
      // Where one got through, those that waited for a signal do, too.
      work(!reached);
    }
  };

  /** Fills the free places; those that wait for a signal only at their time. */
  const work = (freshOnly = false) => {
    if (stopped) return;
    for (const { upload, phase } of queued.values()) {
      if (running.size >= AT_ONCE) return;
      const ready = phase === 'waiting' || (!freshOnly && ['no-signal', 'sign-in'].includes(phase));
      if (ready && !running.has(upload.id)) void run(upload.id);
    }
  };
  const now = () => {
    delay = SHORTEST_MS;
    work();
  };
  const seen = () => document.visibilityState === 'visible' && now();
  window.addEventListener('online', now);
  document.addEventListener('visibilitychange', seen);

  void readUploads(group).then(
    (uploads) => {
      for (const upload of uploads)
        queued.set(upload.id, {
          upload,
          phase: upload.paused ? 'paused' : 'waiting',
          share: arrivedShare(upload),
          kept: true,
        });
      tell();
      work();
    },
    () => tell(),
  );

  return {
    add,
    pause: (id) => {
      set(id, { phase: 'paused' });
      running.get(id)?.abort();
      void change(id, { paused: true });
    },
    goOn: (id) => {
      set(id, { phase: 'waiting', detail: undefined });
      void change(id, { paused: false }).then(() => work(true));
    },
    drop: (id) => {
      const one = queued.get(id);
      running.get(id)?.abort();
      void forget(id);
      const { remove, announcedAt } = one?.upload ?? {};
      if (one && remove !== undefined && announcedAt !== undefined)
        void network.post(pathOf(remove, one.upload), { act: uuidV7() });
    },
    stop: () => {
      stopped = true;
      clearTimeout(timer);
      for (const stop of running.values()) stop.abort();
      window.removeEventListener('online', now);
      document.removeEventListener('visibilitychange', seen);
    },
  };
};
