import type { EntityManager } from '@mikro-orm/postgresql';
import type { SealAct } from '@/domain/inspection/custody/seals';
import type {
  AcceptedSeen,
  CorrectionSeen,
  SealChecked,
  SealGiven,
  SealSeen,
  TransferSeen,
} from '@/domain/paddock/engine-record';
import { isoOf } from '../paperwork/read/read-row';

/** Who had the engine, in order of time. */
export const readTransfers = (em: EntityManager, engineId: string): Promise<TransferSeen[]> =>
  em.execute<TransferSeen[]>(
    `select t.id, t.kind, a.name as from, b.name as to, ${isoOf('t.until_at')} as "untilAt",
       ${isoOf('t.received_at')} as at
     from record.engine_transfer t join public.person a on a.id = t.from_id
     join public.person b on b.id = t.to_id
     where t.engine_id = ? order by t.received_at, t.id`,
    [engineId],
  );

/** What the engine's owners put right of it, in order of time. */
export const readCorrections = (em: EntityManager, engineId: string): Promise<CorrectionSeen[]> =>
  em.execute<CorrectionSeen[]>(
    `select c.id, ${isoOf('c.received_at')} as at, p.name as by,
       json_build_object('blockCasting', c.block_casting_before,
         'headCastings', c.head_castings_before, 'serial', c.serial_before) as before,
       json_build_object('blockCasting', c.block_casting, 'headCastings', c.head_castings,
         'serial', c.serial) as now
     from record.engine_correction c join public.person p on p.id = c.corrected_by
     where c.engine_id = ? order by c.received_at, c.id`,
    [engineId],
  );

/**
 * What was accepted of the engine, whoever declared it: that it was, when, and under which rules. Goes
 * along when the engine changes hands; what the paperwork said does not.
 */
export const readAccepted = (em: EntityManager, engineId: string): Promise<AcceptedSeen[]> =>
  em.execute<AcceptedSeen[]>(
    `select s.name as "seriesName", s.slug as "seriesSlug", s.zone, c.name as "className",
       n.name as "seasonName", p.car_number as "carNumber", v.number,
       encode(v.hash, 'hex') as hash, encode(v.rules_hash, 'hex') as "rulesHash",
       ${isoOf('d.received_at')} as "acceptedAt", p.state = 'withdrawn' as withdrawn
     from public.paperwork p
     join record.paperwork_decision d on d.series_id = p.series_id and d.paperwork_id = p.id
       and d.decision = 'accepted'
     join record.paperwork_version v on v.series_id = p.series_id and v.paperwork_id = p.id
       and v.number = d.number
     join public.series s on s.id = p.series_id
     join public.class c on c.series_id = p.series_id and c.id = p.class_id
     join public.season n on n.series_id = c.series_id and n.id = c.season_id
     where p.engine_id = ? order by d.received_at desc`,
    [engineId],
  );

interface SealStored {
  readonly id: string;
  readonly at: string;
  readonly kind: SealAct['kind'];
  readonly number: string;
  readonly place: string;
  readonly state: 'intact' | 'broken' | 'missing' | 'other-number' | null;
  readonly by: string;
  readonly seriesName: string;
  readonly zone: string;
}

const actOf = ({ kind, number, place, state, by }: SealStored): SealAct =>
  kind === 'found'
    ? { kind, number, place, state: state ?? 'intact' }
    : { kind, number, place, by };

/** Every act on the engine's seals that officials recorded, in all series, by time. */
export const readSealActs = async (
  em: EntityManager,
  engineId: string,
): Promise<readonly SealSeen[]> => {
  const rows = await em.execute<SealStored[]>(
    `select a.id, ${isoOf('a.occurred_at')} as at, a.kind, a.number, a.place, a.state,
       a.done_by as by, s.name as "seriesName", s.zone
     from record.seal_act a join public.series s on s.id = a.series_id
     where a.engine = ? order by a.occurred_at, a.id`,
    [engineId],
  );
  return rows.map((row) => ({
    id: row.id,
    at: row.at,
    act: actOf(row),
    by: row.by,
    seriesName: row.seriesName,
    zone: row.zone,
  }));
};

/** What inspections of the engine found where a rule asks for a seal; without its number. */
export const readSealChecks = (em: EntityManager, engineId: string): Promise<SealChecked[]> =>
  em.execute<SealChecked[]>(
    `select distinct on (r.id) c.requirement ->> 'place' as place, r.answer ->> 'value' as answer,
       v.name as "eventName", ${isoOf('r.occurred_at')} as at, v.zone
     from record.remark r
     join public.inspection i on i.series_id = r.series_id and i.id = r.inspection_id
     join public.paperwork p on p.series_id = i.series_id and p.id = i.paperwork_id
     join public.event v on v.series_id = i.series_id and v.id = i.event_id
     join record.rules u on u.series_id = i.series_id and u.hash = i.rules_hash
     cross join lateral (
       select k -> 'requirement' as requirement
       from jsonb_array_elements(u.document::jsonb -> 'clauses') k
     ) c
     where p.engine_id = ? and r.kind = 'check' and r.standing = 'accepted'
       and c.requirement ->> 'kind' = 'seal' and c.requirement ->> 'subject' = r.subject
     order by r.id`,
    [engineId],
  );

export const readSealsGiven = (em: EntityManager, engineId: string): Promise<SealGiven[]> =>
  em.execute<SealGiven[]>(
    `select w.id, w.seal as number, w.car_number as "carNumber", v.name as "eventName",
       ${isoOf('w.received_at')} as at, v.zone
     from record.engine_swap w
     join public.event v on v.series_id = w.series_id and v.id = w.event_id
     where w.to_engine_id = ? order by w.received_at`,
    [engineId],
  );
