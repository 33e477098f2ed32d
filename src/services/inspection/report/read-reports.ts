import type { EntityManager } from '@mikro-orm/postgresql';

/** One signed report, as it stands for good. */
export interface SignedReport {
  readonly revision: number;
  readonly reason: string;
  /** Hexadecimal. */
  readonly hash: string;
  readonly chainHead: string;
  readonly signedBy: string;
  readonly signer: string;
  readonly signedAt: string;
  /** When the signer last signed in before it; ISO 8601 in UTC. */
  readonly authenticatedAt: string | null;
  /** The ledger's line that it was entered under. */
  readonly line: string | null;
  /** Canonical JSON. */
  readonly document: string;
  /** The pen strokes beside the signature: their document; null where there are none, or none left. */
  readonly strokes: string | null;
}

/** Every revision of an inspection's report, the first one first. */
export const readReports = (
  em: EntityManager,
  seriesId: string,
  inspectionId: string,
): Promise<readonly SignedReport[]> =>
  em.execute<SignedReport[]>(
    `select r.revision, r.reason, encode(r.hash, 'hex') as hash,
            encode(r.chain_head, 'hex') as "chainHead", r.signed_by as "signedBy", p.name as signer,
            to_char(r.signed_at at time zone 'UTC', 'YYYY-MM-DD"T"HH24:MI:SS.MS"Z"') as "signedAt",
            r.signature ->> 'authenticatedAt' as "authenticatedAt", l.index as line, r.document, k.strokes
     from record.report r join public.person p on p.id = r.signed_by
     left join record.ledger_line l on l.series_id = r.series_id and l.act_id = r.act_id
     left join record.signature_strokes k on k.series_id = r.series_id
       and k.inspection_id = r.inspection_id and k.revision = r.revision
     where r.series_id = ? and r.inspection_id = ? order by r.revision`,
    [seriesId, inspectionId],
  );
