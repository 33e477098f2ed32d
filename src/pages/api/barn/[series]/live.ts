import { failure } from '@/domain/failure';
import { fail, ok } from '@/domain/result';
import { read, signInFirst } from '@/http/api';
import { eventStream, type OpenStream } from '@/http/event-stream';
import { followBarn } from '@/services/inspection/live/follow-barn';
import type { BarnHears } from '@/services/ports';

/** A tablet that hears nothing for twice this long opens the stream anew. */
const BEAT_MS = 15_000;
/** Who may listen is asked anew by every connection, so none stays for good. */
const LONGEST_MS = 600_000;
const MOST_STREAMS = 400;

let open = 0;

export const GET = read(async ({ ports, actor, params, context }) => {
  if (actor === null) return fail(signInFirst());
  const seriesId = params['series'] ?? '';
  const early: BarnHears[] = [];
  let hear: (news: BarnHears) => void = (news) => void early.push(news);
  const followed = await followBarn(ports, actor, { seriesId, hear: (news) => hear(news) });
  if (!followed.ok) return followed;
  const { leave, mark, readMark } = followed.value;
  if (open >= MOST_STREAMS) {
    leave();
    return fail(failure('unavailable', 'Too many listen here now; the page asks by itself.'));
  }
  open += 1;
  const { headers, url } = context.request;
  const before = headers.get('last-event-id') ?? new URL(url).searchParams.get('since');
  const begin = ({ say, end }: OpenStream) => {
    say({ event: before === mark ? 'same' : 'refresh', id: mark, data: {} });
    hear = (news) => {
      if (news === 'closing') end();
      else
        void readMark().then(
          (id) =>
            say(
              news === 'missed'
                ? { event: 'refresh', id, data: {} }
                : { event: 'news', id, data: news },
            ),
          end,
        );
    };
    for (const news of early) hear(news);
    const beat = setInterval(() => say({ event: 'beat', data: {} }), BEAT_MS);
    const longest = setTimeout(end, LONGEST_MS);
    return () => {
      clearInterval(beat);
      clearTimeout(longest);
      leave();
      open -= 1;
    };
  };
  return ok(eventStream(begin));
});
