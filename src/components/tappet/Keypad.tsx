import { type PointerEvent, type ReactNode, useEffect } from 'react';
import { type PadKey, padKeyOf, padMayTake } from './keys';

export interface KeypadProps {
  readonly onKey: (key: PadKey) => void;
  /** "0.001 in". */
  readonly unit: string;
  readonly unitNote?: string;
  /** What Enter leads to: "on to 5 intake". */
  readonly enterHint?: string;
  readonly decimal?: '.' | ',';
  /** Whether keys of a hardware keyboard reach the pad from anywhere on the page. */
  readonly listens?: boolean;
  /** What is wanted once in a while, as a button beside the unit. */
  readonly more?: ReactNode;
  /** Strike and photograph, as buttons of class `btn`. */
  readonly acts?: ReactNode;
}

const digits = ['7', '8', '9', '4', '5', '6', '1', '2', '3'] as const;

// A tap must not take the focus: Enter on the keyboard would then press the tapped key again.
const keepFocus = (event: PointerEvent) => event.preventDefault();

/** What was tapped, not reached by keys, gives the keys back: the next Enter belongs to the number. */
const giveBack = (event: MouseEvent) => {
  const { activeElement } = document;
  if (event.detail > 0 && activeElement instanceof HTMLElement && activeElement.matches('button'))
    activeElement.blur();
};

/** The number pad. It holds no number: every key goes to `onKey`, the keyboard's too. */
export const Keypad = (props: KeypadProps) => {
  const { onKey, unit, unitNote = 'unit fixed for this sheet', enterHint, acts } = props;
  const { decimal = '.', listens = true } = props;

  useEffect(() => {
    if (!listens) return;
    const onKeyDown = (event: globalThis.KeyboardEvent) => {
      const key = padKeyOf(event);
      if (key === undefined || event.defaultPrevented || !padMayTake(event.target, key)) return;
      event.preventDefault();
      if (!event.repeat || key === 'erase') onKey(key);
    };
    window.addEventListener('keydown', onKeyDown);
    window.addEventListener('click', giveBack);
    return () => {
      window.removeEventListener('keydown', onKeyDown);
      window.removeEventListener('click', giveBack);
    };
  }, [listens, onKey]);

  const press = (key: PadKey) => ({
    type: 'button' as const,
    onPointerDown: keepFocus,
    onClick: () => onKey(key),
  });

  return (
    <section className="pad" aria-label="Keypad">
      <div className="pad-unit">
        <p>
          <span>{unit}</span>
          <span>{unitNote}</span>
        </p>
        {props.more}
      </div>
      <div className="pad-keys">
        {digits.map((digit) => (
          <button key={digit} className="key" {...press(digit)}>
            {digit}
          </button>
        ))}
        <button className="key" aria-label="Change the sign" {...press('sign')}>
          <svg width="48" height="34" viewBox="0 0 48 34" aria-hidden="true">
            <path
              d="M1 10h17M9.5 1.5v17M17 33L30 1M31 26h16"
              fill="none"
              stroke="currentColor"
              strokeWidth="3.6"
            />
          </svg>
        </button>
        <button className="key" {...press('0')}>
          0
        </button>
        <button className="key" aria-label="Decimal point" {...press('point')}>
          {decimal}
        </button>
        <button className="key" aria-label="Erase the last digit" {...press('erase')}>
          <svg width="40" height="28" viewBox="0 0 40 28" aria-hidden="true">
            <path
              d="M13 2h25v24H13L2 14zM18 9l10 10M28 9L18 19"
              fill="none"
              stroke="currentColor"
              strokeWidth="3.2"
            />
          </svg>
        </button>
        <button className="key key-enter" {...press('enter')}>
          Enter
          {enterHint !== undefined && <small>{enterHint}</small>}
        </button>
      </div>
      {acts !== undefined && <div className="pad-acts">{acts}</div>}
    </section>
  );
};
