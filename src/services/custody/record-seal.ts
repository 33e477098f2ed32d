import type { SealRequest } from '@/contracts/custody/custody';
import type { Actor } from '@/domain/access/permission';
import { absent, type Failure } from '@/domain/failure';
import { canonicalJson } from '@/domain/ledger/canonical';
import { fail, ok, type Result } from '@/domain/result';
import { toDocument } from '@/domain/rulebook/document';
import { performAct } from '../act/perform-act';
import { findInspectionRow } from '../inspection/read/find-inspection';
import type { Ports } from '../ports';
import { findEngineKey } from './read-seals';

/** Records a seal as it was applied, found or removed; what does not follow is kept and shown. */
export const recordSeal = async (
  deps: Pick<Ports, 'db' | 'clock' | 'random' | 'jobs'>,
  actor: Actor,
  input: SealRequest,
): Promise<Result<{ readonly id: string }, Failure>> => {
  const { act, ...seal } = input;
  const inspection = await findInspectionRow(deps.db, actor, 'custody.record', seal.inspectionId);
  if (inspection === null) return fail(absent());
  const { seriesId, id: inspectionId } = inspection;
  return performAct(
    deps,
    actor,
    {
      id: act,
      kind: 'record-seal',
      seriesId,
      input: toDocument({ ...seal, state: seal.state ?? undefined }),
    },
    async ({ em, append, line }) => {
      const engine = await findEngineKey(em, seriesId, inspectionId);
      append('seal_act', [
        {
          series_id: seriesId,
          id: seal.id,
          engine,
          inspection_id: inspectionId,
          kind: seal.kind,
          number: seal.number,
          place: seal.place,
          state: seal.state,
          done_by: seal.doneBy,
          note: seal.note,
          occurred_at: seal.occurredAt,
          recorded_by: actor.personId,
        },
      ]);
      line({
        seriesId,
        kind: 'seal-recorded',
        contents: {
          seal: {
            text: canonicalJson(
              toDocument({
                document: 'tagwire/seal',
                version: '1',
                ...seal,
                state: seal.state ?? undefined,
                engine,
                by: actor.personId,
              }),
            ),
            open: false,
          },
        },
        refs: { inspection: inspectionId },
      });
      return ok({ id: seal.id });
    },
  );
};
