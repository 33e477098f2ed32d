import type { EntityManager } from '@mikro-orm/postgresql';
import { sha256, toHex } from '@/domain/ledger/bytes';
import { PREVIEW_WIDTHS } from '../../file/make-previews';
import type { Ports } from '../../ports';
import { type AuditFault, faultIn } from './fault';

const MOST_BYTES = 100_000_000;
const AT_ONCE = 8;
const inObjects = faultIn('objects');

interface Kept {
  readonly key: string;
  readonly sha256: string;
  readonly bytes: string;
}

/** Files and PDFs whose hash is in the record, by the key that they are kept under. */
const readKept = (em: EntityManager, seriesId: string) =>
  em.execute<Kept[]>(
    `select object_key as key, encode(sha256, 'hex') as sha256, bytes from record.notice_pdf
     where series_id = ?
     union
     select object_key, encode(sha256, 'hex'), bytes from public.file
     where series_id = ? and state = 'kept'`,
    [seriesId, seriesId],
  );

/** Hashes that signed documents name, each of which must still have its file. */
const readNamed = (em: EntityManager, seriesId: string) =>
  em.execute<{ sha256: string }[]>(
    `select jsonb_path_query(append.json_of(document), '$.photographs[*].sha256') #>> '{}' as sha256
     from record.report where series_id = ?
     union
     select jsonb_path_query(append.json_of(document), p::jsonpath) #>> '{}'
     from record.paperwork_version, unnest(array['$.photographs[*].sha256', '$.files[*].sha256']) p
     where series_id = ?`,
    [seriesId, seriesId],
  );

/** Several at once: the store answers each after a while, and most of it is waiting. */
const faultsOf = async <T>(
  all: readonly T[],
  look: (one: T) => Promise<AuditFault | undefined>,
): Promise<readonly AuditFault[]> => {
  const faults: AuditFault[] = [];
  for (let from = 0; from < all.length; from += AT_ONCE)
    for (const fault of await Promise.all(all.slice(from, from + AT_ONCE).map(look)))
      if (fault !== undefined) faults.push(fault);
  return faults;
};

/** What the ledger says was erased, of which no file of any series holds the same bytes, is gone. */
const erasedFaults = async (
  { db, objects }: Pick<Ports, 'db' | 'objects'>,
  erased: ReadonlySet<string>,
): Promise<readonly AuditFault[]> => {
  const again = await db.execute<{ sha256: string }[]>(
    `select distinct encode(sha256, 'hex') as sha256 from public.file
     where encode(sha256, 'hex') = any(?::text[])`,
    [`{${[...erased].join()}}`],
  );
  const kept = new Set(again.map((one) => one.sha256));
  const keys = [...erased]
    .filter((hash) => !kept.has(hash))
    .flatMap((hash) => [
      `originals/${hash}`,
      ...PREVIEW_WIDTHS.map((width) => `previews/${hash}/${width}.jpg`),
    ]);
  return faultsOf(keys, async (key) =>
    (await objects.findHead(key)) === undefined
      ? undefined
      : inObjects(key, 'The ledger says that it was erased, and it is still here.'),
  );
};

/**
 * Every object read and hashed again; every hash that a signed document names has an object; nothing is
 * left of what the ledger says was erased.
 */
export const auditObjects = async (
  deps: Pick<Ports, 'db' | 'objects'>,
  seriesId: string,
  erased: ReadonlySet<string>,
): Promise<readonly AuditFault[]> => {
  const { db, objects } = deps;
  const kept = await readKept(db, seriesId);
  const read = await faultsOf(kept, async ({ key, sha256: wanted, bytes }) => {
    try {
      const found = await objects.read(key, MOST_BYTES);
      return found.length === Number(bytes) && toHex(sha256(found)) === wanted
        ? undefined
        : inObjects(key, 'The object is another than was recorded.');
    } catch {
      return inObjects(key, 'The object cannot be read.');
    }
  });
  const present = new Set(kept.map((one) => one.sha256));
  const words = 'A signed document names this file, and it is not kept.';
  const lost = (await readNamed(db, seriesId)).flatMap(({ sha256: named }) =>
    present.has(named) || erased.has(named) ? [] : [inObjects(named, words)],
  );
  return [...read, ...lost, ...(await erasedFaults(deps, erased))];
};
