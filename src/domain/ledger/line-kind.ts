/** The kinds of act that make a line. Names are permanent; new ones are added at the end. */
export const LINE_KINDS = [
  'rulebook-published',
  'bulletin-published',
  'clarification-published',
  'waiver-published',
  'paperwork-handed-in',
  'paperwork-decided',
  'cars-selected',
  'inspection-opened',
  'report-signed',
  'report-revised',
  'verdict-published',
  'verdict-final',
  'notice-pdf',
  'draw-committed',
  'draw-made',
  'draw-void',
  'key-published',
  'restore-recorded',
  'content-erased',
  'protest-handed-in',
  'protest-decided',
  'bond-recorded',
  'bond-settled',
  'appeal-handed-in',
  'appeal-decided',
  'inspection-changed',
  'clarification-withdrawn',
  'bulletin-acknowledged',
  'entries-changed',
  'results-official',
  'results-taken-back',
  'event-cleared',
  'interest-declared',
  'served-otherwise',
] as const;

export type LineKind = (typeof LINE_KINDS)[number];

export const isLineKind = (kind: string): kind is LineKind =>
  (LINE_KINDS as readonly string[]).includes(kind);
