import { LockMode } from '@mikro-orm/core';
import { type Actor, may } from '@/domain/access/permission';
import { absent, type Failure, failure, invalid } from '@/domain/failure';
import { fail, ok, type Result } from '@/domain/result';
import { Entry } from '@/entities/event/entry';
import { performAct } from '../../act/perform-act';
import type { Ports } from '../../ports';
import { readEntryAcknowledgements } from './acknowledged-entries';
import { appendAcknowledgements } from './append-acknowledgements';

/**
 * An official records that somebody signing on for an entry says to have read bulletins: who, and
 * when. Those that were acknowledged before are left as they are.
 */
export const recordSignOn = async (
  deps: Pick<Ports, 'db' | 'clock' | 'random' | 'jobs'>,
  actor: Actor,
  input: {
    readonly act: string;
    readonly seriesId: string;
    readonly eventId: string;
    readonly entryId: string;
    readonly bulletinIds: readonly string[];
    /** Of the one who stands there. */
    readonly name: string;
  },
): Promise<Result<{ readonly recorded: number }, Failure>> => {
  if (!may(actor, 'event.manage', input.seriesId)) return fail(absent());
  const { act: id, seriesId, eventId, entryId } = input;
  const bulletinIds = [...new Set(input.bulletinIds)].sort();
  const name = input.name.trim();
  return performAct(
    deps,
    actor,
    { id, kind: 'record-sign-on', seriesId, input: { eventId, entryId, bulletinIds, name } },
    async (act) => {
      const entry = await act.em.findOne(
        Entry,
        { seriesId, id: entryId, eventId },
        { lockMode: LockMode.PESSIMISTIC_WRITE },
      );
      if (entry === null) return fail(absent());
      if (entry.state !== 'entered') {
        return fail(failure('not-in-this-state', 'This entry is withdrawn.'));
      }
      const bulletins = await act.em.execute<{ id: string; hash: Buffer }[]>(
        `select id, hash from record.rule_publication
         where series_id = ? and class_id = ? and kind = 'bulletin' and id = any(?::uuid[])
         order by number`,
        [seriesId, entry.classId, `{${bulletinIds.join(',')}}`],
      );
      if (bulletins.length < bulletinIds.length) return fail(absent());
      const faults = [
        ...(name === '' || name.length > 120
          ? [{ pointer: '/name', detail: 'Write the name of the one who has read it.' }]
          : []),
        ...(bulletinIds.length === 0
          ? [{ pointer: '/bulletinIds', detail: 'Say which bulletins were read.' }]
          : []),
      ];
      if (faults.length > 0) return fail(invalid(faults));
      const before = await readEntryAcknowledgements(act.em, seriesId, eventId);
      const known = new Set(
        before.filter((one) => one.entryId === entryId).map((one) => one.bulletinId),
      );
      const missing = bulletins.filter((one) => !known.has(one.id));
      if (missing.length > 0) {
        appendAcknowledgements(
          deps,
          act,
          actor,
          seriesId,
          missing.map((one) => ({
            bulletinId: one.id,
            hash: one.hash,
            way: 'in-person',
            personId: entry.competitorId ?? null,
            entryId,
            name,
          })),
        );
      }
      return ok({ recorded: missing.length });
    },
  );
};
