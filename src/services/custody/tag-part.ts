import type { EntityManager } from '@mikro-orm/postgresql';
import type { HeldPartRequest } from '@/contracts/custody/custody';
import type { Actor } from '@/domain/access/permission';
import { absent, type Failure } from '@/domain/failure';
import { sha256, utf8 } from '@/domain/ledger/bytes';
import { canonicalJson } from '@/domain/ledger/canonical';
import { fail, ok, type Result } from '@/domain/result';
import { toDocument } from '@/domain/rulebook/document';
import { Entry } from '@/entities/event/entry';
import { performAct } from '../act/perform-act';
import { findInspectionRow } from '../inspection/read/find-inspection';
import type { Ports } from '../ports';

/** The series' next tag; its row stays locked through the commit. */
const takeTag = async (em: EntityManager, seriesId: string): Promise<string> => {
  const [row] = await em.execute<{ last: number }[]>(
    `insert into public.tag_counter (series_id, last) values (?, 1)
     on conflict (series_id) do update set last = public.tag_counter.last + 1 returning last`,
    [seriesId],
  );
  return `T-${String(row?.last).padStart(4, '0')}`;
};

/** Takes a part into custody under a new tag: the first link of its chain. */
export const tagPart = async (
  deps: Pick<Ports, 'db' | 'clock' | 'random' | 'jobs'>,
  actor: Actor,
  input: HeldPartRequest,
): Promise<Result<{ readonly id: string; readonly tag: string }, Failure>> => {
  const { act, ...part } = input;
  const inspection = await findInspectionRow(deps.db, actor, 'custody.record', part.inspectionId);
  if (inspection === null) return fail(absent());
  const { seriesId, eventId, entryId } = inspection;
  return performAct(
    deps,
    actor,
    { id: act, kind: 'tag-part', seriesId, input: toDocument(part) },
    async ({ em, append, line }) => {
      const { carNumber } = await em.findOneOrFail(Entry, { seriesId, id: entryId });
      const tag = await takeTag(em, seriesId);
      const { id, inspectionId } = part;
      const document = canonicalJson(
        toDocument({
          document: 'tagwire/held-part',
          version: '1',
          series: seriesId,
          event: eventId,
          car: carNumber,
          tag,
          ...part,
          holdUntil: part.holdUntil ?? undefined,
        }),
      );
      const hash = sha256(utf8(document));
      const recorded = { series_id: seriesId, recorded_by: actor.personId };
      append('held_part', [
        {
          ...recorded,
          id,
          tag,
          kind: part.kind,
          event_id: eventId,
          inspection_id: inspectionId,
          car_number: carNumber,
          words: part.words,
          place_on_engine: part.placeOnEngine,
          clause: part.clause,
          bag: part.bag,
          hold_until: part.holdUntil,
          taken_at: part.takenAt,
          document,
          hash,
        },
      ]);
      append('custody_act', [
        {
          ...recorded,
          id: deps.random.uuid(),
          part_id: id,
          kind: 'taken',
          giver: part.takenFrom,
          receiver: part.takenBy,
          witness: '',
          bag: part.bag,
          place: part.place,
          reason: '',
          occurred_at: part.takenAt,
        },
      ]);
      line({
        seriesId,
        kind: 'part-tagged',
        contents: { part: { text: document, open: false } },
        refs: { part: id, inspection: inspectionId },
      });
      return ok({ id, tag });
    },
  );
};
