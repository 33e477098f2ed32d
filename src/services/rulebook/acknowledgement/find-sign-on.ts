import type { Actor } from '@/domain/access/permission';
import type { Failure } from '@/domain/failure';
import { toHex } from '@/domain/ledger/bytes';
import { ok, type Result } from '@/domain/result';
import { type EntryListed, type EventSheet, findEvent } from '../../event/find-event';
import type { Ports } from '../../ports';
import { readPublications, standingRules } from '../find-rules';
import { publicationDocument } from '../publication';
import { type EntryAcknowledgement, readEntryAcknowledgements } from './acknowledged-entries';

export interface BulletinInForce {
  readonly id: string;
  readonly number: number;
  readonly title: string;
  readonly hash: string;
}

export interface SignOnEntry {
  readonly entry: EntryListed;
  /** Beside each bulletin in force: who read it and when, or nothing. */
  readonly read: readonly {
    readonly bulletin: BulletinInForce;
    readonly by: EntryAcknowledgement | undefined;
  }[];
}

export interface SignOnClass {
  readonly id: string;
  readonly name: string;
  readonly slug: string;
  readonly bulletins: readonly BulletinInForce[];
  readonly entries: readonly SignOnEntry[];
  /** Entries that have read every bulletin in force. */
  readonly complete: number;
}

export interface SignOn extends Pick<EventSheet, 'event' | 'series'> {
  readonly classes: readonly SignOnClass[];
}

/** When the rules of sign-on are asked: at the event's start, or now while it is under way. */
const askedAt = ({ startsAt, endsAt }: EventSheet['event'], now: Date): Date =>
  now < startsAt ? startsAt : now < endsAt ? now : endsAt;

/** Which entries of an event have read which bulletins in force there, class by class. */
export const findSignOn = async (
  deps: Pick<Ports, 'db' | 'clock'>,
  actor: Actor,
  eventId: string,
): Promise<Result<SignOn, Failure>> => {
  const found = await findEvent(deps, actor, eventId);
  if (!found.ok) return found;
  const { event, series, classes, entries } = found.value;
  const at = askedAt(event, deps.clock.now());
  const given = new Map(
    (await readEntryAcknowledgements(deps.db, series.id, event.id)).map((one) => [
      `${one.entryId} ${one.bulletinId}`,
      one,
    ]),
  );
  const rows: SignOnClass[] = [];
  for (const { id, name, slug } of classes) {
    const own = entries.filter((entry) => entry.classId === id && entry.state === 'entered');
    if (own.length === 0) continue;
    const published = await readPublications(deps.db, series.id, id);
    const rules = standingRules(published, at)?.rules;
    const bulletins = published.bulletins
      .filter((one) => rules?.bulletins.includes(one.number))
      .map((one) => ({
        id: one.id,
        number: one.number,
        title: one.title,
        hash: toHex(publicationDocument({ kind: 'bulletin', content: one }).hash),
      }));
    const listed = own.map((entry) => ({
      entry,
      read: bulletins.map((bulletin) => ({
        bulletin,
        by: given.get(`${entry.id} ${bulletin.id}`),
      })),
    }));
    const complete = listed.filter((one) => one.read.every((row) => row.by !== undefined)).length;
    rows.push({ id, name, slug, bulletins, entries: listed, complete });
  }
  return ok({ event, series, classes: rows });
};
