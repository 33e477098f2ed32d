import { inTakingOrder, positionKey, type RemarkRow } from '../capture/rows';

/** Which of several sets of one bore stands, as a person said, with the reason. */
export interface SetChoice {
  /** A set's number; `pooled`: their mean. */
  readonly stands: number | 'pooled';
  readonly reason: string;
  readonly by: string;
}

/** The last choice made at each bore. */
export const choicesFrom = (remarks: readonly RemarkRow[]): ReadonlyMap<string, SetChoice> =>
  new Map(
    inTakingOrder(remarks)
      .filter((row) => row.kind === 'second-set' && row.standing === 'accepted')
      .map((row) => [
        positionKey(row.place, 'bore'),
        {
          stands: row.answer.value === 'pooled' ? 'pooled' : Number(row.answer.value),
          reason: row.reason,
          by: row.takenBy,
        },
      ]),
  );
