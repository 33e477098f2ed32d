import { canonicalJson } from '@/domain/ledger/canonical';
import type { Act } from '../../act/perform-act';

export interface EntryChanged {
  readonly id: string;
  readonly entryId: string;
  readonly kind: 'late-entry' | 'scratched' | 'restored' | 'class' | 'engine' | 'driver';
  readonly was: string;
  readonly becomes: string;
  readonly reason: string;
}

/** Keeps changes of entries on the day, and writes one line for all of them: for the parties only. */
export const keepChanges = (
  { append, line }: Pick<Act, 'append' | 'line'>,
  of: { readonly seriesId: string; readonly eventId: string; readonly by: string },
  changes: readonly EntryChanged[],
): void => {
  if (changes.length === 0) return;
  append(
    'entry_change',
    changes.map(({ id, entryId, kind, was, becomes, reason }) => ({
      series_id: of.seriesId,
      id,
      event_id: of.eventId,
      entry_id: entryId,
      kind,
      was,
      becomes,
      reason,
      changed_by: of.by,
    })),
  );
  line({
    seriesId: of.seriesId,
    kind: 'entries-changed',
    contents: {
      changes: {
        text: canonicalJson({
          v: '1',
          type: 'tagwire/entry-changes',
          event: of.eventId,
          by: of.by,
          changes: changes.map((one) => ({ ...one })),
        }),
        open: false,
      },
    },
    refs: { event: of.eventId },
  });
};
