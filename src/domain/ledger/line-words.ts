import { isLineKind, type LineKind } from './line-kind';

/** What happened, as a sentence for somebody who was not there. */
const WORDS: { readonly [K in LineKind]: string } = {
  'rulebook-published': 'A rulebook edition was published.',
  'bulletin-published': 'A bulletin that changes the rules was published.',
  'clarification-published': 'A clarification of a clause was published.',
  'waiver-published': 'A waiver of a clause was published.',
  'paperwork-handed-in': 'An engine’s paperwork was handed in.',
  'paperwork-decided': 'Paperwork was accepted or returned.',
  'cars-selected': 'Cars were picked for inspection.',
  'inspection-opened': 'An inspection was opened.',
  'report-signed': 'An inspection report was signed and closed.',
  'report-revised': 'A signed report was corrected by a new revision.',
  'verdict-published': 'A verdict was published as a notice.',
  'verdict-final': 'A verdict became final.',
  'notice-pdf': 'The PDF of a notice was made; its hash stands here.',
  'draw-committed': 'A draw was announced: pool, hash of the secret, values to come.',
  'draw-made': 'A draw was made.',
  'draw-void': 'A draw was ended without a result.',
  'key-published': 'A key that signs this ledger was published.',
  'restore-recorded': 'The database was restored, and lines were lost.',
  'content-erased': 'Content of earlier lines was erased; the lines stay.',
  'protest-handed-in': 'A protest was handed in.',
  'protest-decided': 'A protest was decided.',
  'bond-recorded': 'A bond was paid in.',
  'bond-settled': 'A bond was returned or kept.',
  'appeal-handed-in': 'An appeal was handed in.',
  'appeal-decided': 'An appeal was decided.',
  'inspection-changed': 'The state of an inspection changed.',
  'clarification-withdrawn': 'A clarification of a clause was withdrawn.',
  'bulletin-acknowledged': 'Somebody said to have read a bulletin.',
  'entries-changed': 'Entries were changed on the day, each with its reason.',
  'results-official': 'The results of a class became official.',
  'results-taken-back': 'Results that were official became unofficial again.',
  'event-cleared': 'The checks of an event without teardown were signed.',
  'interest-declared': 'An inspector’s interest in a competitor was declared or ended.',
  'served-otherwise': 'Somebody whom a message did not reach was served otherwise.',
};

/** Kinds of later versions are shown by their own name. */
export const lineWords = (kind: string): string =>
  isLineKind(kind) ? WORDS[kind] : `An act of the kind “${kind}”.`;
