import type { EntityManager } from '@mikro-orm/postgresql';
import type { Pick as CarPick } from '@/contracts/event/event';
import { absent, type Failure, type Fault, failure, invalid } from '@/domain/failure';
import { toHex } from '@/domain/ledger/bytes';
import { canonicalJson } from '@/domain/ledger/canonical';
import { fail, ok, type Result } from '@/domain/result';
import type { BoreLayout } from '@/domain/tappet/layout/bore-layout';
import { GENERIC_LAYOUTS } from '@/domain/tappet/layout/generic-layouts';
import { Entry } from '@/entities/event/entry';
import type { Event } from '@/entities/event/event';
import { Inspection } from '@/entities/event/inspection';
import type { Act } from '../act/perform-act';
import { findRules } from '../rulebook/find-rules';
import { pickedAlready } from './picked-already';

interface Accepted {
  readonly id: string;
  readonly number: number;
  readonly layout: BoreLayout | null;
}

/** The last version of an entry's paperwork that was accepted, with its position map. */
const findAccepted = async (
  em: EntityManager,
  { seriesId, classId, carNumber, competitorId, paperworkId, engineId = null }: Entry,
): Promise<Accepted | undefined> => {
  const [row] = await em.execute<Accepted[]>(
    `select p.id, v.number, v.document::jsonb #> '{engine,layout}' as layout
     from public.paperwork p
     join record.paperwork_decision d
       on d.series_id = p.series_id and d.paperwork_id = p.id and d.decision = 'accepted'
     join record.paperwork_version v
       on v.series_id = p.series_id and v.paperwork_id = p.id and v.number = d.number
       and v.document is not null
     where p.series_id = ? and p.state <> 'withdrawn'
       and (?::uuid is null or p.engine_id = ?) and (p.id = ? or (p.class_id = ? and p.car_number = ? and p.competitor_id = ?))
     order by (p.id = ?) desc nulls last, v.number desc limit 1`,
    [seriesId, engineId, engineId, paperworkId, classId, carNumber, competitorId, paperworkId],
  );
  return row;
};

/** Stored documents hold no numbers: cylinders come back as text. */
const numbered = (layout: BoreLayout): BoreLayout => ({
  ...layout,
  banks: layout.banks.map((bank) => ({
    ...bank,
    cylinders: bank.cylinders.map(Number),
    bores: bank.bores.map((bore) => ({ ...bore, cylinder: Number(bore.cylinder) })),
  })),
});

/**
 * Opens an inspection for each picked car, within an act that holds the event's row: the rules in force
 * at the event's start and the accepted paperwork are pinned to it. One ledger line for all.
 */
export const openInspections = async (
  { em, at, keepRules, line }: Pick<Act, 'em' | 'at' | 'keepRules' | 'line'>,
  event: Event,
  by: string,
  picks: readonly CarPick[],
): Promise<Result<readonly string[], Failure>> => {
  const { seriesId, id: eventId } = event;
  const faults: Fault[] = [];
  const rulesOf = new Map<string, Uint8Array>();
  const open: Record<string, string>[] = [];
  for (const [index, pick] of picks.entries()) {
    const say = (detail: string) => faults.push({ pointer: `/picks/${index}/entryId`, detail });
    const entry = await em.findOne(Entry, { seriesId, eventId, id: pick.entryId });
    if (entry === null) return fail(absent());
    const { carNumber, classId } = entry;
    if (entry.state === 'withdrawn') say(`Car ${carNumber} is withdrawn.`);
    const before = await pickedAlready(em, seriesId, entry.id, event.zone);
    if (before !== undefined) say(`Car ${carNumber} is picked already: ${before}.`);
    if (!rulesOf.has(classId)) {
      const found = await findRules(em, seriesId, classId, event.startsAt);
      if (found === undefined)
        return fail(
          failure(
            'not-in-this-state',
            `No rulebook of car ${carNumber}’s class is in force at the event’s start. Publish an edition first.`,
          ),
        );
      rulesOf.set(classId, await keepRules(seriesId, found.document));
    }
    const rulesHash = rulesOf.get(classId) ?? new Uint8Array();
    const accepted = await findAccepted(em, entry);
    if (accepted !== undefined) entry.paperworkId ??= accepted.id;
    const generic =
      GENERIC_LAYOUTS.find((layout) => layout.name === pick.layout) ?? GENERIC_LAYOUTS[0];
    const layout = accepted?.layout ? numbered(accepted.layout) : generic;
    if (layout === undefined) throw new Error('There is no position map at all.');
    em.persist(
      em.create(Inspection, {
        seriesId,
        id: pick.inspectionId,
        eventId,
        entryId: entry.id,
        paperworkId: accepted?.id ?? null,
        paperworkNumber: accepted?.number ?? null,
        pickedBecause: pick.because,
        pickedWords: pick.words.trim(),
        pickedBy: by,
        pickedAt: at,
        rulesHash: Buffer.from(rulesHash),
        layout,
        state: 'to-do',
        stateReason: '',
        correctionReason: '',
        bay: '',
        inspectorId: null,
        openedAt: null,
        closedAt: null,
        version: 1,
      }),
    );
    open.push({
      inspection: pick.inspectionId,
      car: carNumber,
      because: pick.because,
      rules: toHex(rulesHash),
    });
  }
  if (faults.length > 0) return fail(invalid(faults));
  const reasons = picks.map(({ inspectionId, words }) => ({ inspection: inspectionId, words }));
  const type = { v: '1', event: eventId } as const;
  line({
    seriesId,
    kind: 'cars-selected',
    contents: {
      picks: {
        text: canonicalJson({ ...type, type: 'tagwire/picks', picks: open }),
        open: true,
      },
      // Why a car was nominated may name people: for the parties only.
      reasons: {
        text: canonicalJson({ ...type, type: 'tagwire/pick-reasons', reasons }),
        open: false,
      },
    },
    refs: { event: eventId },
  });
  return ok(picks.map((pick) => pick.inspectionId));
};
