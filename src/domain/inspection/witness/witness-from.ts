import { inTakingOrder, type RemarkRow } from '../capture/rows';
import type { Witness } from '../report';

/** The last witness counts; nobody who stood by is told as such. */
export const witnessFrom = (remarks: readonly RemarkRow[]): Witness => {
  const last = inTakingOrder(remarks).findLast(
    (row) => row.kind === 'witness' && row.standing === 'accepted',
  );
  if (last === undefined) return { name: '', role: '', outcome: 'absent' };
  return {
    name: last.subject,
    role: 'competitor’s representative',
    outcome: last.answer.value === 'signed' ? 'signed' : 'refused',
    ...(last.reason === '' ? {} : { remark: last.reason }),
  };
};
