import type { CustodyRequest } from '@/contracts/custody/custody';
import { type Actor, seriesWhere } from '@/domain/access/permission';
import { absent, type Failure } from '@/domain/failure';
import { isId } from '@/domain/is-id';
import { canonicalJson } from '@/domain/ledger/canonical';
import { fail, ok, type Result } from '@/domain/result';
import { toDocument } from '@/domain/rulebook/document';
import { performAct } from '../act/perform-act';
import type { Ports } from '../ports';

/**
 * Records what happened to a held part. Whatever is said is kept, also where it does not follow from
 * what was said before: the history shows that as a gap.
 */
export const recordCustody = async (
  deps: Pick<Ports, 'db' | 'clock' | 'random' | 'jobs'>,
  actor: Actor,
  input: CustodyRequest,
): Promise<Result<{ readonly id: string }, Failure>> => {
  const { act, ...said } = input;
  const series = seriesWhere(actor, 'custody.record');
  if (series.length === 0 || !isId(said.partId)) return fail(absent());
  const [part] = await deps.db.execute<{ seriesId: string; inspection: string | null }[]>(
    `select series_id as "seriesId", inspection_id as inspection from record.held_part
     where id = ? and series_id in (${series.map(() => '?').join(', ')})`,
    [said.partId, ...series],
  );
  if (part === undefined) return fail(absent());
  const { seriesId } = part;
  return performAct(
    deps,
    actor,
    { id: act, kind: 'record-custody', seriesId, input: toDocument(said) },
    async ({ append, line }) => {
      append('custody_act', [
        {
          series_id: seriesId,
          id: said.id,
          part_id: said.partId,
          kind: said.kind,
          giver: said.giver,
          receiver: 'receiver' in said ? said.receiver : '',
          witness: 'witness' in said ? said.witness : '',
          bag: 'bag' in said ? said.bag : '',
          place: said.place,
          reason: said.reason,
          occurred_at: said.occurredAt,
          recorded_by: actor.personId,
        },
      ]);
      line({
        seriesId,
        kind: 'custody-recorded',
        contents: {
          custody: {
            text: canonicalJson(
              toDocument({
                document: 'tagwire/custody',
                version: '1',
                ...said,
                by: actor.personId,
              }),
            ),
            open: false,
          },
        },
        refs: {
          part: said.partId,
          ...(part.inspection === null ? {} : { inspection: part.inspection }),
        },
      });
      return ok({ id: said.id });
    },
  );
};
