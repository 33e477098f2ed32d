import pg from 'pg';
import { type BarnNews, readBarnNews } from '@/domain/inspection/barn-news';
import type { BarnFeed } from '@/services/ports';

const CHANNEL = 'tagwire_barn';
const AGAIN_MS = 2_000;

type Hear = Parameters<BarnFeed['subscribe']>[1];

/**
 * Listens on one connection of its own and hands each notification to whoever follows its series.
 * A lost connection is opened again; everybody is then told that something may have been missed.
 */
export const openBarnFeed = (
  databaseUrl: string,
  onError: (error: Error) => void,
): BarnFeed & { readonly close: () => Promise<void> } => {
  const followers = new Map<string, Set<Hear>>();
  let client: pg.Client | undefined;
  let opening: Promise<void> | undefined;
  let closed = false;
  let retry: ReturnType<typeof setTimeout> | undefined;

  const tellAll = (what: 'missed' | 'closing') => {
    for (const hears of followers.values()) for (const hear of [...hears]) hear(what);
  };
  const tell = (news: BarnNews) => {
    for (const hear of [...(followers.get(news.series) ?? [])]) hear(news);
  };
  const lost = (error?: Error) => {
    if (error !== undefined) onError(error);
    client = undefined;
    opening = undefined;
    if (closed || followers.size === 0) return;
    retry ??= setTimeout(() => {
      retry = undefined;
      void listen().then(() => tellAll('missed'), lost);
    }, AGAIN_MS);
    retry.unref();
  };
  const open = async (): Promise<void> => {
    const fresh = new pg.Client({
      connectionString: databaseUrl,
      application_name: 'tagwire-barn',
      keepAlive: true,
    });
    fresh.on('notification', ({ payload = '' }) => {
      const news = readBarnNews(payload);
      if (news !== undefined) tell(news);
    });
    let failed = false;
    const fail = (error?: Error) => {
      if (failed || closed) return;
      failed = true;
      void fresh.end().catch(() => undefined);
      lost(error);
    };
    await fresh.connect();
    fresh.on('error', fail);
    fresh.on('end', () => fail());
    await fresh.query(`listen ${CHANNEL}`);
    client = fresh;
  };
  const listen = (): Promise<void> => {
    opening ??= open();
    return opening;
  };

  return {
    subscribe: async (seriesId, hear) => {
      if (closed) throw new Error('The feed is closed.');
      const hears = followers.get(seriesId) ?? new Set();
      followers.set(seriesId, hears.add(hear));
      const leave = () => {
        hears.delete(hear);
        if (hears.size === 0 && followers.get(seriesId) === hears) followers.delete(seriesId);
      };
      try {
        await listen();
      } catch (error) {
        leave();
        opening = undefined;
        throw error;
      }
      return leave;
    },
    close: async () => {
      closed = true;
      if (retry !== undefined) clearTimeout(retry);
      tellAll('closing');
      followers.clear();
      await client?.end().catch(() => undefined);
    },
  };
};
