import type { EntityManager } from '@mikro-orm/postgresql';
import { sha256, toHex } from '@/domain/ledger/bytes';
import type { Ports } from '../../ports';
import { type AuditFault, faultIn } from './fault';

const MOST_BYTES = 100_000_000;

/** Files and PDFs whose hash is in the record, by the key that they are kept under. */
const readKept = (em: EntityManager, seriesId: string) =>
  em.execute<{ key: string; sha256: string; bytes: string }[]>(
    `select object_key as key, encode(sha256, 'hex') as sha256, bytes from record.notice_pdf
     where series_id = ?
     union
     select object_key, encode(sha256, 'hex'), bytes from public.file
     where series_id = ? and state = 'kept' and removed_at is null`,
    [seriesId, seriesId],
  );

/** Hashes that signed documents name, each of which must still have its file. */
const readNamed = (em: EntityManager, seriesId: string) =>
  em.execute<{ sha256: string }[]>(
    `select p ->> 'sha256' as sha256 from record.report r,
       jsonb_array_elements(r.document::jsonb -> 'photographs') p where r.series_id = ?
     union
     select p ->> 'sha256' from record.paperwork_version v,
       jsonb_array_elements((v.document::jsonb -> 'photographs') || (v.document::jsonb -> 'files')) p
     where v.series_id = ?`,
    [seriesId, seriesId],
  );

/** Every object read and hashed again; every hash that a signed document names has an object. */
export const auditObjects = async (
  { db, objects }: Pick<Ports, 'db' | 'objects'>,
  seriesId: string,
  erased: ReadonlySet<string>,
): Promise<readonly AuditFault[]> => {
  const inObjects = faultIn('objects');
  const kept = await readKept(db, seriesId);
  const faults: AuditFault[] = [];
  for (const { key, sha256: wanted, bytes } of kept) {
    if (erased.has(wanted)) continue;
    try {
      const found = await objects.read(key, MOST_BYTES);
      if (found.length !== Number(bytes) || toHex(sha256(found)) !== wanted)
        faults.push(inObjects(key, 'The object is another than was recorded.'));
    } catch {
      faults.push(inObjects(key, 'The object cannot be read.'));
    }
  }
  const present = new Set(kept.map((one) => one.sha256));
  for (const { sha256: named } of await readNamed(db, seriesId)) {
    if (!present.has(named) && !erased.has(named))
      faults.push(inObjects(named, 'A signed document names this file, and it is not kept.'));
  }
  return faults;
};
