export type PaperworkState = 'draft' | 'handed-in' | 'accepted' | 'returned' | 'withdrawn';

/** One remark beside an item: a question's or sheet's subject, a photograph's, or `general`. */
export interface ItemRemark {
  readonly item: string;
  readonly text: string;
}

/** The competitor can still write in it. */
export const isWritable = (state: PaperworkState): boolean =>
  state === 'draft' || state === 'returned';

export const STATE_WORDS: Readonly<Record<PaperworkState, string>> = {
  draft: 'Draft',
  'handed-in': 'Handed in',
  accepted: 'Accepted',
  returned: 'Returned with remarks',
  withdrawn: 'Withdrawn',
};

export const NOT_AN_APPROVAL = 'Acceptance is not approval of the engine.';
