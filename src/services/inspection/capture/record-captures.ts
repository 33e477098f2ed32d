import { LockMode } from '@mikro-orm/core';
import type { CapturesAnswer, CapturesRequest } from '@/contracts/inspection/captures';
import type { Actor } from '@/domain/access/permission';
import { absent, type Failure, invalid } from '@/domain/failure';
import { sha256, toHex, utf8 } from '@/domain/ledger/bytes';
import { canonicalJson } from '@/domain/ledger/canonical';
import { chainNextHash } from '@/domain/ledger/chain';
import { fail, ok, type Result } from '@/domain/result';
import { toDocument } from '@/domain/rulebook/document';
import { Event } from '@/entities/event/event';
import { Inspection } from '@/entities/event/inspection';
import { performAct } from '../../act/perform-act';
import type { Ports } from '../../ports';
import { interestsIn } from '../interest';
import { findInspectionRow } from '../read/find-inspection';
import { readChain } from '../read/inspection-file';
import { readRows } from '../read/rows';
import { appendRows } from './append-rows';
import { marksOf, rowFaults } from './check-rows';
import { rowsNotCounted } from './row-standing';

/**
 * Records what a tablet took, exactly once: one batch, the next link of the inspection's chain.
 * Whatever an inspector of the series sends is kept; what may not count is kept as received, with
 * the reason. Two tablets wait for each other at the inspection's row, so the chain stays linear.
 */
export const recordCaptures = async (
  deps: Pick<Ports, 'db' | 'clock' | 'random' | 'jobs'>,
  actor: Actor,
  input: CapturesRequest & { readonly inspectionId: string },
): Promise<Result<CapturesAnswer, Failure>> => {
  const { act, inspectionId, clockOffsetMs, rows, tablet } = input;
  const seen = await findInspectionRow(deps.db, actor, 'inspection.record', inspectionId);
  if (seen === null) return fail(absent());
  const { seriesId } = seen;
  return performAct(
    deps,
    actor,
    {
      id: act,
      kind: 'record-captures',
      seriesId,
      input: toDocument({ inspectionId, clockOffsetMs, rows, tablet }),
    },
    async ({ em, at, append }) => {
      const inspection = await em.findOneOrFail(
        Inspection,
        { seriesId, id: inspectionId },
        { lockMode: LockMode.PESSIMISTIC_WRITE },
      );
      const faults = await rowFaults(em, { seriesId, inspectionId }, rows);
      if (faults.length > 0) return fail(invalid(faults));
      const { zone } = await em.findOneOrFail(Event, { seriesId, id: inspection.eventId });
      const interest = (await interestsIn(em, inspection)).get(actor.personId);
      const recorded = () => readRows(em, seriesId, inspectionId);
      const notCounted = await rowsNotCounted({ actor, inspection, interest, recorded }, rows);
      const marks = await marksOf(em, { seriesId, zone }, rows);
      const chain = await readChain(em, seriesId, inspectionId);
      const document = canonicalJson(
        toDocument({
          v: '1',
          type: 'tagwire/batch',
          inspection: inspectionId,
          act,
          by: actor.personId,
          clockOffsetMs,
          receivedAt: at.toISOString(),
          ...(notCounted.size > 0 && { receivedRows: Object.fromEntries(notCounted) }),
          ...(marks.size > 0 && { marked: Object.fromEntries(marks) }),
          rows,
          tablet,
        }),
      );
      const batch = chain.batches + 1;
      const head = chainNextHash(chain.head, sha256(utf8(document)));
      append('capture_batch', [
        {
          series_id: seriesId,
          inspection_id: inspectionId,
          number: batch,
          previous: chain.head,
          document,
          head,
        },
      ]);
      appendRows(
        append,
        {
          seriesId,
          inspectionId,
          batch,
          takenBy: actor.personId,
          clockOffsetMs,
          notCounted,
          marks,
        },
        rows,
      );
      return ok({
        batch,
        head: toHex(head),
        receivedAt: at.toISOString(),
        received: [...notCounted].map(([id, reason]) => ({ id, reason })),
        marked: [...marks].map(([id, reason]) => ({ id, reason })),
      });
    },
  );
};
