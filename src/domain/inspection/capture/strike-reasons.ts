/** Why a reading is struck. It stays on record, with its reason. */
export const STRIKE_REASONS = {
  'wrong-value': 'Written wrong',
  'sign-lost': 'Sign lost',
  'gauge-slipped': 'Gauge slipped or was knocked',
  'zero-lost': 'Zero lost',
  'zero-moved': 'Zero moved: the closing zero failed',
  'dirt-or-burr': 'Dirt or a burr in the way',
  'on-an-oil-hole': 'Taken on an oil hole or groove',
  'part-not-settled': 'Part hot, not settled',
  'wrong-part': 'Another part was measured',
} as const;

export type StrikeReason = keyof typeof STRIKE_REASONS;

export const isStrikeReason = (text: string): text is StrikeReason =>
  Object.hasOwn(STRIKE_REASONS, text);
