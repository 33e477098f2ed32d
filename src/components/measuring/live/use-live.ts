import { useCallback, useEffect, useRef, useState } from 'react';
import { followBarn, type LiveState } from '@/components/barn/live';
import type { CapturesAnswer } from '@/contracts/inspection/captures';
import type { Sheet } from '../sheet/sheet';
import { fetchSheet } from './fetch-sheet';
import { newer } from './newer';
import { oneAtATime } from './one-at-a-time';
import { seenFrom } from './seen';

/** How long news of this person's own sendings wait for the answer to them, which tells the same. */
const ANSWER_MS = 500;

interface Live {
  /** With every tablet's rows, as far as this one has heard. */
  readonly sheet: Sheet;
  readonly link: LiveState;
  /** Told of each own sending that the server has kept. */
  readonly onKept: (answer: CapturesAnswer) => void;
}

/** Follows one inspection: what another tablet records is on this sheet at once, without a reload. */
export const useLive = (first: Sheet): Live => {
  const [sheet, setSheet] = useState(first);
  const [link, setLink] = useState<LiveState>('connecting');
  const seen = useRef(seenFrom(first.batch));
  const [turn, setTurn] = useState(0);

  useEffect(() => {
    const leave = new AbortController();
    const readAnew = oneAtATime(async () => {
      const now = await fetchSheet(first, leave.signal);
      if (now === undefined || leave.signal.aborted) return;
      seen.current.read(now.batch);
      setSheet((before) => newer(before, now));
    });
    const timers = new Set<number>();
    const readUnlessSeen = (batch: number) => {
      if (!seen.current.has(batch)) readAnew();
    };
    const end = followBarn(first.seriesId, {
      since: first.mark,
      onNews: (news) => {
        if (news.kind === 'check' || news.inspection !== first.inspectionId) return;
        if (news.kind === 'inspection') readAnew();
        else if (news.by !== first.personId) readUnlessSeen(news.batch);
        else timers.add(window.setTimeout(readUnlessSeen, ANSWER_MS, news.batch));
      },
      onRefresh: readAnew,
      onState: setLink,
    });
    const stop = () => {
      end();
      for (const timer of timers) window.clearTimeout(timer);
      leave.abort();
    };
    // A page that comes back as it was left has missed what happened meanwhile.
    const back = ({ persisted }: PageTransitionEvent) => {
      if (persisted) setTurn(turn + 1);
    };
    window.addEventListener('pagehide', stop);
    window.addEventListener('pageshow', back);
    return () => {
      window.removeEventListener('pagehide', stop);
      window.removeEventListener('pageshow', back);
      stop();
    };
  }, [first, turn]);

  const onKept = useCallback(({ batch, received, marked }: CapturesAnswer) => {
    // What does not count, or counts for no breach, is read as the server has it.
    if (received.length === 0 && marked.length === 0) seen.current.sent(batch);
  }, []);
  return { sheet, link, onKept };
};
