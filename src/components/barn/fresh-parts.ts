import { followBarn, type LiveState } from './live';

/** Typed in, chosen or opened by the person at this tablet, and so not to be pulled away. */
const inUse = (part: HTMLElement): boolean =>
  // What came back with problems is to be read and mended first.
  part.dataset['kept'] !== undefined ||
  part.contains(document.activeElement) ||
  [...part.querySelectorAll<HTMLInputElement>('input, textarea')].some((field) =>
    ['checkbox', 'radio'].includes(field.type)
      ? field.checked !== field.defaultChecked
      : field.type !== 'hidden' && field.value !== field.defaultValue,
  ) ||
  [...part.querySelectorAll('option')].some(
    (one) => one.selected !== one.defaultSelected && one.value !== '',
  );

/** Puts the parts of a freshly read page in the place of those shown. Gives whether one was in use. */
export const replaceParts = (fresh: Document): boolean => {
  let held = false;
  for (const part of document.querySelectorAll<HTMLElement>('[data-part]')) {
    const other = fresh.querySelector(`[data-part="${CSS.escape(part.dataset['part'] ?? '')}"]`);
    if (other === null || part.innerHTML === other.innerHTML) continue;
    if (inUse(part)) {
      // What differs only by the acts made anew for each form is no change.
      if (part.textContent !== other.textContent) held = true;
      continue;
    }
    const open = [...part.querySelectorAll('details')].map((one) => one.open);
    part.replaceChildren(...[...other.childNodes].map((node) => document.importNode(node, true)));
    for (const [at, one] of [...part.querySelectorAll('details')].entries())
      one.open = open[at] ?? one.open;
  }
  return held;
};

const WORDS: Readonly<Record<LiveState, string>> = {
  connecting: 'Reaching the barn',
  live: 'Live: other tablets show here at once',
  asking: 'Not live: asking every 10 s',
};

const clock = (): string => {
  const now = new Date();
  return [now.getHours(), now.getMinutes(), now.getSeconds()]
    .map((part) => String(part).padStart(2, '0'))
    .join(':');
};

/**
 * Keeps the parts of this page that carry `data-part` as the server has them now. `about` tells
 * which news concern this page; without script the page is simply read again by hand.
 */
export const keepFresh = (
  line: HTMLElement,
  series: readonly { readonly id: string; readonly since: string | undefined }[],
  about: (news: { readonly inspection?: string; readonly event?: string }) => boolean,
): void => {
  const words = line.querySelector<HTMLElement>('[data-live-words]');
  const held = line.querySelector<HTMLElement>('[data-live-held]');
  const stops: (() => void)[] = [];
  let reading = false;
  let again = false;
  const leave = new AbortController();
  const readAnew = async (): Promise<void> => {
    if (reading) {
      again = true;
      return;
    }
    reading = true;
    try {
      do {
        again = false;
        const answer = await fetch(location.href, {
          headers: { accept: 'text/html' },
          signal: leave.signal,
        });
        if (!answer.ok || new URL(answer.url).pathname !== location.pathname) break;
        const fresh = new DOMParser().parseFromString(await answer.text(), 'text/html');
        if (held !== null) held.hidden = !replaceParts(fresh);
        line.dataset['freshAt'] = clock();
      } while (again);
    } catch {
      // Left, or out of reach: the next word from the barn or the next asking reads again.
    } finally {
      reading = false;
    }
  };
  for (const { id, since } of series)
    stops.push(
      followBarn(id, {
        since,
        onNews: (news) => void (about(news) && readAnew()),
        onRefresh: () => void readAnew(),
        onState: (state) => {
          line.dataset['live'] = state;
          if (words !== null) words.textContent = WORDS[state];
        },
      }),
    );
  const stop = () => {
    for (const end of stops) end();
    leave.abort();
  };
  addEventListener('pagehide', stop);
  // What this page sends changes it anyway: the answer shows it.
  document.addEventListener('submit', stop);
};
