import type { EntityManager } from '@mikro-orm/postgresql';
import { toHex } from '@/domain/ledger/bytes';
import type { PaperworkFile } from '@/domain/paperwork/declare';
import type { PaperworkDraft } from '@/domain/paperwork/draft';
import type { ItemRemark, PaperworkState } from '@/domain/paperwork/state';
import type { BoreLayout } from '@/domain/tappet/layout/bore-layout';

/** One paperwork with the names around it. */
export interface PaperworkRow {
  readonly seriesId: string;
  readonly seriesName: string;
  readonly seriesSlug: string;
  readonly zone: string;
  readonly seasonName: string;
  readonly seasonSlug: string;
  readonly id: string;
  readonly classId: string;
  readonly className: string;
  readonly classSlug: string;
  readonly competitorId: string;
  readonly competitorName: string;
  readonly competitorEmail: string;
  readonly carNumber: string;
  readonly state: PaperworkState;
  readonly draft: PaperworkDraft;
  readonly versions: number;
  readonly version: number;
  /** ISO 8601 instants in UTC, here and below. */
  readonly updatedAt: string;
  readonly engineId: string;
  readonly reference: string;
  readonly layout: BoreLayout;
  readonly blockCasting: string;
  readonly headCastings: string;
  readonly serial: string;
}

/** An instant as ISO 8601 in UTC: raw rows are read without a mapper. */
export const isoOf = (column: string): string =>
  `to_char(${column} at time zone 'UTC', 'YYYY-MM-DD"T"HH24:MI:SS.MS"Z"')`;

const SELECT = `
select p.series_id as "seriesId", s.name as "seriesName", s.slug as "seriesSlug", s.zone,
  n.name as "seasonName", n.slug as "seasonSlug", p.id, p.class_id as "classId",
  c.name as "className", c.slug as "classSlug", p.competitor_id as "competitorId",
  o.name as "competitorName", o.email as "competitorEmail", p.car_number as "carNumber", p.state,
  p.draft, p.versions, p.version, ${isoOf('p.updated_at')} as "updatedAt", e.id as "engineId", e.reference,
  e.layout, e.block_casting as "blockCasting", e.head_castings as "headCastings", e.serial
from public.paperwork p
join public.series s on s.id = p.series_id
join public.class c on c.series_id = p.series_id and c.id = p.class_id
join public.season n on n.series_id = c.series_id and n.id = c.season_id
join public.engine e on e.id = p.engine_id
join public.person o on o.id = p.competitor_id`;

/** Rows that meet the condition; every caller asks for permission in it or before. */
export const readPaperwork = (
  em: EntityManager,
  where: string,
  parameters: readonly unknown[],
): Promise<PaperworkRow[]> =>
  em.execute<PaperworkRow[]>(`${SELECT} where ${where}`, [...parameters]);

export interface StoredFile extends PaperworkFile {
  readonly state: 'expected' | 'kept' | 'refused';
  readonly refusedBecause: string | null;
  readonly keptAt: string | null;
  readonly hasPreviews: boolean;
}

interface FileRow {
  readonly id: string;
  readonly purpose: 'photograph' | 'sheet';
  readonly item: string;
  readonly name: string;
  readonly state: StoredFile['state'];
  readonly media_type: string | null;
  readonly bytes: string | null;
  readonly sha256: Buffer | null;
  readonly refused_because: string | null;
  readonly kept_at: string | null;
  readonly has_previews: boolean;
}

/** The files of a draft, in the order in which they were announced; those taken out are left out. */
export const readFiles = async (
  em: EntityManager,
  seriesId: string,
  paperworkId: string,
): Promise<readonly StoredFile[]> => {
  const rows = await em.execute<FileRow[]>(
    `select id, purpose, item, name, state, media_type, bytes, sha256, refused_because,
       ${isoOf('kept_at')} as kept_at,
       previews is not null as has_previews
     from public.file where series_id = ? and paperwork_id = ? and removed_at is null
     order by created_at, id`,
    [seriesId, paperworkId],
  );
  return rows.map((row) => ({
    purpose: row.purpose,
    item: row.item,
    fileId: row.id,
    name: row.name,
    sha256: row.sha256 === null ? '' : toHex(new Uint8Array(row.sha256)),
    bytes: row.bytes ?? '',
    type: row.media_type ?? '',
    state: row.state,
    refusedBecause: row.refused_because,
    keptAt: row.kept_at,
    hasPreviews: row.has_previews,
  }));
};

export const isKept = (file: StoredFile): boolean => file.state === 'kept';

/** A file as a document declares it. */
export const declaredFile = ({
  purpose,
  item,
  fileId,
  name,
  sha256,
  bytes,
  type,
}: StoredFile): PaperworkFile => ({ purpose, item, fileId, name, sha256, bytes, type });

export interface VersionRow {
  readonly number: number;
  readonly hash: string;
  readonly rulesHash: string;
  /** The ledger's line that it was entered under. */
  readonly line: number;
  readonly receivedAt: string;
  readonly decision: 'accepted' | 'returned' | null;
  readonly remarks: readonly ItemRemark[];
  readonly decidedAt: string | null;
  readonly decidedBy: string | null;
}

/** Every version that was handed in, newest first, with what was decided on it. */
export const readVersions = async (
  em: EntityManager,
  seriesId: string,
  paperworkId: string,
): Promise<readonly VersionRow[]> => {
  const rows = await em.execute<
    (Omit<VersionRow, 'remarks' | 'line'> & {
      readonly line: string;
      readonly remarks: readonly ItemRemark[] | null;
    })[]
  >(
    `select v.number, encode(v.hash, 'hex') as hash, encode(v.rules_hash, 'hex') as "rulesHash", l.index as line,
       ${isoOf('v.received_at')} as "receivedAt", d.decision, d.remarks,
       ${isoOf('d.received_at')} as "decidedAt",
       o.name as "decidedBy"
     from record.paperwork_version v
     join record.ledger_line l on l.series_id = v.series_id and l.act_id = v.act_id
     left join record.paperwork_decision d on d.series_id = v.series_id
       and d.paperwork_id = v.paperwork_id and d.number = v.number
     left join public.person o on o.id = d.decided_by
     where v.series_id = ? and v.paperwork_id = ? order by v.number desc`,
    [seriesId, paperworkId],
  );
  return rows.map((row) => ({
    ...row,
    line: Number(row.line),
    remarks: row.remarks ?? [],
  }));
};
