import type { EntityManager } from '@mikro-orm/postgresql';
import { failure } from '@/domain/failure';
import { canonicalJson } from '@/domain/ledger/canonical';
import { formatVerifierKey } from '@/domain/ledger/note/verifier-key';
import { keyDocumentShape } from '@/domain/ledger/verify/follow-keys';
import { fail, ok } from '@/domain/result';
import { performAct } from '../../act/perform-act';
import type { Ports } from '../../ports';

export interface PublishedKeyDocument {
  readonly index: number;
  /** Verifier key. */
  readonly key: string;
  /** The key before it; empty for the first. */
  readonly replaces: string;
}

/** The newest key that a series had published within its first `size` lines; of all, unless asked. */
export const findPublishedKey = async (
  em: EntityManager,
  seriesId: string,
  size = Number.MAX_SAFE_INTEGER,
): Promise<PublishedKeyDocument | undefined> => {
  const [row] = await em.execute<{ index: string; content: string }[]>(
    `select l.index, c.content from record.ledger_line l
     join record.ledger_content c
       on c.series_id = l.series_id and c.line_index = l.index and c.role = 'key'
     where l.series_id = ? and l.kind = 'key-published' and l.index < ?
     order by l.index desc limit 1`,
    [seriesId, size],
  );
  if (row === undefined) return undefined;
  const { key, replaces } = keyDocumentShape.parse(JSON.parse(row.content));
  return { index: Number(row.index), key, replaces };
};

/** One signer of heads and publisher of keys at a time, whichever process it is in; until commit. */
export const lockSigning = (em: EntityManager, seriesId: string): Promise<unknown> =>
  em.execute('select pg_advisory_xact_lock(hashtextextended(?, 0))', [`sign ${seriesId}`]);

/**
 * Publishes the installation's key in the series' ledger where that was not done: as the first key,
 * or handed over by the one published before, which must then be at hand to sign for it.
 */
export const publishKey = async (
  deps: Pick<Ports, 'db' | 'clock' | 'random' | 'jobs' | 'keys' | 'recordState'>,
  seriesId: string,
): Promise<void> => {
  const key = formatVerifierKey(deps.keys.signer(seriesId).key);
  if ((await findPublishedKey(deps.db, seriesId))?.key === key) return;
  const act = { id: deps.random.uuid(), kind: 'publish-key', seriesId, input: { key } };
  const done = await performAct(deps, null, act, async ({ em, line }) => {
    await lockSigning(em, seriesId);
    const published = await findPublishedKey(em, seriesId);
    if (published?.key === key) return ok(null);
    const previous = deps.keys.findPrevious(seriesId);
    const handsOver = previous !== undefined && formatVerifierKey(previous.key) === published?.key;
    if (published !== undefined && !handsOver) {
      const words = 'The key file holds another key than the one this series publishes.';
      return fail(
        failure('unavailable', `${words} Give the one before it as well: it hands over.`),
      );
    }
    const replaces = published?.key ?? '';
    const text = canonicalJson({ v: '1', type: 'tagwire/key', key, replaces });
    line({ seriesId, kind: 'key-published', contents: { key: { text, open: true } } });
    return ok(null);
  });
  if (!done.ok) throw new Error(done.failure.detail);
};
