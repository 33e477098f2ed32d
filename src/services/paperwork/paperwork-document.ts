import { toHex } from '@/domain/ledger/bytes';
import type { PaperworkDocument } from '@/domain/paperwork/document';
import type { CheckedPaperwork } from './check-paperwork';
import type { PaperworkRow } from './read/read-row';

/** What is frozen, hashed and kept when paperwork is handed in. */
export const paperworkDocument = (
  row: PaperworkRow,
  { declared, standing }: CheckedPaperwork,
): PaperworkDocument => {
  const { engineId: id, reference, layout, blockCasting, headCastings, serial } = row;
  const replies = row.state === 'returned' ? (row.draft.replies ?? []) : [];
  return {
    document: 'tagwire/paperwork',
    version: '1',
    series: row.seriesName,
    season: row.seasonName,
    className: row.className,
    competitor: row.competitorName,
    carNumber: row.carNumber,
    engine: { id, reference, layout, blockCasting, headCastings, serial },
    rulesHash: toHex(standing.hash),
    answers: declared.answers,
    sheets: declared.sheets,
    photographs: declared.photographs,
    files: declared.files,
    note: row.draft.note,
    ...(replies.length > 0 && { replies }),
  };
};
