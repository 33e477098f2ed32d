import type { Actor } from '@/domain/access/permission';
import { absent, type Failure } from '@/domain/failure';
import { isId } from '@/domain/is-id';
import { fail, ok, type Result } from '@/domain/result';
import type { BoreLayout } from '@/domain/tappet/layout/bore-layout';
import { isoOf } from '../paperwork/read/read-row';
import type { Ports } from '../ports';

export interface EngineSeen {
  readonly id: string;
  readonly reference: string;
  readonly layout: BoreLayout;
  readonly blockCasting: string;
  readonly headCastings: string;
  readonly serial: string;
  readonly version: number;
  readonly owner: string;
  readonly ownerId: string;
  /** On loan to whom, and until when; nothing while it is with its owner. */
  readonly heldBy: string | null;
  readonly holderId: string | null;
  readonly heldUntil: string | null;
  /** An offer that is not accepted yet. */
  readonly offerId: string | null;
  readonly offeredTo: string | null;
  readonly offerKind: 'sold' | 'lent' | null;
}

export type Standing = 'owner' | 'lender' | 'borrower' | 'helper';

export interface OpenedEngine {
  readonly engine: EngineSeen;
  readonly standing: Standing;
  /** Whose engine paperwork it is seen for: the actor's own, or the customer's. */
  readonly competitorId: string;
}

/** What the actor is to an engine: by owning or borrowing it now, or by a grant on it. */
const standingOf = (
  actor: Actor,
  engine: EngineSeen,
): { readonly standing: Standing; readonly competitorId: string } | undefined => {
  const holder = engine.holderId ?? engine.ownerId;
  const { personId: competitorId } = actor;
  if (engine.ownerId === competitorId)
    return { standing: engine.holderId === null ? 'owner' : 'lender', competitorId };
  if (holder === competitorId) return { standing: 'borrower', competitorId };
  const helped = (actor.helping ?? []).some(
    ({ competitorId: whom, engineIds, rights }) =>
      whom === holder &&
      rights.some((right) => right !== 'verdicts') &&
      (engineIds === undefined || engineIds.includes(engine.id)),
  );
  return helped ? { standing: 'helper', competitorId: holder } : undefined;
};

/** An engine that the actor owns, has on loan, or works on for a customer; absent to everybody else. */
export const openEngine = async (
  { db, clock }: Pick<Ports, 'db' | 'clock'>,
  actor: Actor,
  engineId: string,
): Promise<Result<OpenedEngine, Failure>> => {
  if (!isId(engineId)) return fail(absent());
  const now = clock.now();
  const [engine] = await db.execute<EngineSeen[]>(
    `select e.id, e.reference, e.layout, e.block_casting as "blockCasting", e.version,
       e.head_castings as "headCastings", e.serial, o.name as owner, e.owner_id as "ownerId",
       h.name as "heldBy", h.id as "holderId",
       case when h.id is not null then ${isoOf('e.held_until')} end as "heldUntil",
       f.id as "offerId", f.email as "offeredTo", f.kind as "offerKind"
     from public.engine e join public.person o on o.id = e.owner_id
     left join public.person h on h.id = e.holder_id and e.held_until > ?
     left join public.engine_offer f on f.engine_id = e.id and f.accepted_at is null
       and f.withdrawn_at is null and f.expires_at > ?
     where e.id = ?`,
    [now, now, engineId],
  );
  const found = engine && standingOf(actor, engine);
  return engine && found ? ok({ engine, ...found }) : fail(absent());
};
