import { type BarnNews, readBarnNews } from '@/domain/inspection/barn-news';

/** `live`: told at once. `asking`: the stream failed, and the page asks by itself. */
export type LiveState = 'connecting' | 'live' | 'asking';

/** What a browser's EventSource is to this client. */
export interface Stream {
  addEventListener(name: string, listen: (event: { readonly data?: string }) => void): void;
  close(): void;
  readonly readyState: number;
}

export interface Follower {
  /** How far the series had come when the page was made: nothing is read anew where that is still so. */
  readonly since?: string | undefined;
  /** One act of another tablet, or of this one. */
  readonly onNews: (news: BarnNews) => void;
  /** Something may have been missed, or it is time to ask: read anew. */
  readonly onRefresh: () => void;
  readonly onState?: (state: LiveState) => void;
}

export interface Means {
  readonly open: (path: string) => Stream;
  readonly after: (ms: number, run: () => void) => () => void;
}

const SILENCE_MS = 40_000;
const ASK_MS = 10_000;
const AGAIN_MS = 30_000;
const CLOSED = 2;

const inBrowser: Means = {
  open: (path) => new EventSource(path) as unknown as Stream,
  after: (ms, run) => {
    const timer = setTimeout(run, ms);
    return () => clearTimeout(timer);
  },
};

/**
 * Follows a series' barn over server-sent events. The browser opens a lost stream again by itself
 * and says how far it had come; where the stream is refused or falls silent, `onRefresh` is called
 * every ten seconds and the stream is tried anew every thirty.
 *
 * @returns ends the following; call it when the page is left
 */
export const followBarn = (
  seriesId: string,
  { since, onNews, onRefresh, onState = () => undefined }: Follower,
  means: Means = inBrowser,
): (() => void) => {
  let stream: Stream | undefined;
  let stopped = false;
  let state: LiveState = 'connecting';
  let read = since;
  let endSilence = () => {};
  let waits = false;
  let endAsking = () => {};
  let endAgain = () => {};

  const become = (next: LiveState) => {
    if (state === next) return;
    state = next;
    onState(next);
  };
  const heard = () => {
    endSilence();
    endSilence = means.after(SILENCE_MS, failed);
    endAsking();
    endAgain();
    become('live');
  };
  // Asked for again while it waits, it keeps its time: a stream that fails every few seconds would put it off for good.
  const ask = () => {
    if (waits) return;
    waits = true;
    const end = means.after(ASK_MS, () => {
      waits = false;
      onRefresh();
      ask();
    });
    endAsking = () => {
      waits = false;
      end();
    };
  };
  const failed = () => {
    stream?.close();
    stream = undefined;
    endSilence();
    if (stopped) return;
    read = undefined;
    become('asking');
    ask();
    endAgain();
    endAgain = means.after(AGAIN_MS, connect);
  };
  const connect = () => {
    if (stopped) return;
    // The browser says by itself how far it had come when a stream is interrupted; a new one is told.
    const from = read === undefined ? '' : `?since=${encodeURIComponent(read)}`;
    const opened = means.open(`/api/barn/${seriesId}/live${from}`);
    stream = opened;
    opened.addEventListener('same', heard);
    opened.addEventListener('beat', heard);
    opened.addEventListener('refresh', () => {
      heard();
      onRefresh();
    });
    opened.addEventListener('news', ({ data = '' }) => {
      heard();
      const news = readBarnNews(data);
      if (news !== undefined) onNews(news);
    });
    // A stream that is only interrupted comes back by itself; until then the page asks.
    opened.addEventListener('error', () => {
      if (stream !== opened) return;
      if (opened.readyState === CLOSED) failed();
      else {
        become('asking');
        ask();
      }
    });
    endSilence();
    endSilence = means.after(SILENCE_MS, failed);
  };
  connect();
  return () => {
    stopped = true;
    endSilence();
    endAsking();
    endAgain();
    stream?.close();
  };
};
