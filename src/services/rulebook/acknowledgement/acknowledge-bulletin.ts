import type { Actor } from '@/domain/access/permission';
import { absent, type Failure, stale } from '@/domain/failure';
import { toHex } from '@/domain/ledger/bytes';
import { fail, ok, type Result } from '@/domain/result';
import { performAct } from '../../act/perform-act';
import type { Ports } from '../../ports';
import { mayAsk } from '../question/ask-question';
import { appendAcknowledgements } from './append-acknowledgements';

/**
 * A competitor or builder says to have read a bulletin. The hash is that of the document that was
 * shown; the name is the actor's. A second time changes nothing.
 */
export const acknowledgeBulletin = async (
  deps: Pick<Ports, 'db' | 'clock' | 'random' | 'jobs'>,
  actor: Actor,
  input: {
    readonly act: string;
    readonly seriesId: string;
    readonly bulletinId: string;
    readonly hash: string;
  },
): Promise<Result<{ readonly acknowledgedAt: string }, Failure>> => {
  if (!mayAsk(actor, input.seriesId)) return fail(absent());
  const { act: id, seriesId, bulletinId, hash } = input;
  return performAct(
    deps,
    actor,
    { id, kind: 'acknowledge-bulletin', seriesId, input: { bulletinId, hash } },
    async (act) => {
      const [bulletin] = await act.em.execute<{ hash: Buffer; since: Date | null }[]>(
        `select p.hash, (select min(a.acknowledged_at) from record.bulletin_acknowledgement a
           where a.series_id = p.series_id and a.bulletin_id = p.id and a.person_id = ?) as since
         from record.rule_publication p
         where p.series_id = ? and p.id = ? and p.kind = 'bulletin'`,
        [actor.personId, seriesId, bulletinId],
      );
      if (bulletin === undefined) return fail(absent());
      if (toHex(bulletin.hash) !== hash) return fail(stale());
      if (bulletin.since !== null) {
        return ok({ acknowledgedAt: new Date(bulletin.since).toISOString() });
      }
      appendAcknowledgements(deps, act, actor, seriesId, [
        {
          bulletinId,
          hash: bulletin.hash,
          way: 'own',
          personId: actor.personId,
          entryId: null,
          name: actor.name,
        },
      ]);
      return ok({ acknowledgedAt: act.at.toISOString() });
    },
  );
};
