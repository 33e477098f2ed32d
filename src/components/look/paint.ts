/**
 * Paint for SVG presentation attributes: the theme's variable, with the day value for a drawing that
 * is shown without the style sheet.
 */
export const paint = {
  plate: 'var(--color-plate, #eef0ea)',
  card: 'var(--color-card, #fbfbf7)',
  ink: 'var(--color-ink, #12202b)',
  ink2: 'var(--color-ink-2, #44525c)',
  edge: 'var(--color-edge, #66726c)',
  hair: 'var(--color-hair, #c9cfc7)',
  marking: 'var(--color-marking, #1b3a8c)',
  within: 'var(--color-within, #0b5d4a)',
  outside: 'var(--color-outside, #a3161f)',
  onOutside: 'var(--color-on-outside, #fbfbf7)',
  close: 'var(--color-close, #ffc83d)',
  onClose: 'var(--color-on-close, #12202b)',
  tintClose: 'var(--color-tint-close, #fff0cc)',
} as const;

/** Font families for SVG text. */
export const face = {
  num: 'var(--font-num, B612, Verdana, sans-serif)',
  text: 'var(--font-text, Barlow, Arial, sans-serif)',
  head: 'var(--font-head, "Barlow Semi Condensed", "Arial Narrow", sans-serif)',
} as const;
