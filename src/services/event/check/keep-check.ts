import { toHex } from '@/domain/ledger/bytes';
import { canonicalJson } from '@/domain/ledger/canonical';
import type { Act } from '../../act/perform-act';

/** A row of `record.event_check` by its columns, but for the act's id. */
export interface CheckRow extends Readonly<Record<string, unknown>> {
  readonly series_id: string;
  readonly id: string;
  readonly event_id: string;
  readonly entry_id: string;
  readonly clause: string;
  readonly rules_hash: Uint8Array;
  readonly taken_by: string;
}

/** Keeps one check and its line, whose content is for the parties only. */
export const keepCheck = ({ append, line }: Pick<Act, 'append' | 'line'>, row: CheckRow): void => {
  append('event_check', [row]);
  const texts = Object.entries(row).filter(
    ([, value]) => typeof value === 'string' && value !== '',
  );
  line({
    seriesId: row.series_id,
    kind: 'check-recorded',
    contents: {
      check: {
        text: canonicalJson({
          v: '1',
          type: 'tagwire/line-check',
          check: Object.fromEntries(texts),
        }),
        open: false,
      },
    },
    refs: { event: row.event_id, rules: toHex(row.rules_hash) },
  });
};
