/** What the keypad and a hardware keyboard can both say. */
export type PadKey =
  | '0'
  | '1'
  | '2'
  | '3'
  | '4'
  | '5'
  | '6'
  | '7'
  | '8'
  | '9'
  | 'point'
  | 'sign'
  | 'erase'
  | 'enter';

interface KeyPress {
  readonly key: string;
  readonly ctrlKey: boolean;
  readonly metaKey: boolean;
  readonly altKey: boolean;
}

const named: Readonly<Record<string, PadKey>> = {
  '.': 'point',
  ',': 'point',
  Decimal: 'point',
  '-': 'sign',
  '\u2212': 'sign',
  Backspace: 'erase',
  Enter: 'enter',
};

/** The pad's key for a hardware key; none for shortcuts and for all other keys. */
export const padKeyOf = (press: KeyPress): PadKey | undefined => {
  if (press.ctrlKey || press.metaKey || press.altKey) return undefined;
  return /^[0-9]$/.test(press.key) ? (press.key as PadKey) : named[press.key];
};

/** Elements that have their own use for what is typed. */
const OWN_KEYS = 'input, textarea, select, [contenteditable], dialog[open]';

/** Buttons and links use Enter themselves, unless they stand for the bore or cell already chosen. */
const OWN_ENTER = ':is(button, a[href], summary):not([aria-current="true"])';

/** Whether the pad may take a press that arrived at `target`. */
export const padMayTake = (target: EventTarget | null, key: PadKey): boolean => {
  if (!(target instanceof Element)) return true;
  if (target.closest(OWN_KEYS) !== null) return false;
  return key !== 'enter' || target.closest(OWN_ENTER) === null;
};
