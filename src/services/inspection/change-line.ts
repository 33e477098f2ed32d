import { toHex } from '@/domain/ledger/bytes';
import { canonicalJson } from '@/domain/ledger/canonical';
import type { Inspection } from '@/entities/event/inspection';
import type { NewLedgerLine } from '../act/append';

/** What an act of an inspection says beside the state; empty texts are left out. */
export interface ChangeSaid {
  readonly change: string;
  readonly reason: string;
  readonly by: string;
  /** Where it is taken apart or kept. */
  readonly place?: string | undefined;
  /** Numbers of seals, as they were put on or found. */
  readonly seals?: string | undefined;
  /** Number of the bag or crate. */
  readonly bag?: string | undefined;
  readonly inspector?: string | undefined;
  readonly inspectorBefore?: string | undefined;
}

/** The ledger's line for one act of an inspection; its content is for the parties only. */
export const changeLine = (inspection: Inspection, said: ChangeSaid): NewLedgerLine => ({
  seriesId: inspection.seriesId,
  kind: said.change === 'open' ? 'inspection-opened' : 'inspection-changed',
  contents: {
    change: {
      text: canonicalJson({
        v: '1',
        type: 'tagwire/inspection-change',
        inspection: inspection.id,
        state: inspection.state,
        bay: inspection.bay,
        ...Object.fromEntries(
          Object.entries(said).filter(
            ([key, value]) =>
              value !== undefined && (value !== '' || key === 'reason' || key === 'by'),
          ),
        ),
      }),
      open: false,
    },
  },
  refs: { inspection: inspection.id, rules: toHex(inspection.rulesHash) },
});
