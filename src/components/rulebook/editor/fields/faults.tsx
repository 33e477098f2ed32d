import { createContext, type ReactNode, useContext } from 'react';
import type { Fault } from '@/domain/failure';

/** What is ambiguous in the clause being edited; pointers begin within the clause, `/heading`. */
export const FaultsHere = createContext<readonly Fault[]>([]);

/** The id of the field at a pointer, so that a fault leads to it. */
export const fieldId = (at: string): string => `clause${at}`;

export const useFaultsAt = (at: string): readonly Fault[] =>
  useContext(FaultsHere).filter((fault) => fault.pointer === at);

/** Puts the eye on the field at a pointer, or on the nearest place above it. */
export const focusField = (at: string): void => {
  const steps = at.split('/');
  for (let n = steps.length; n > 0; n -= 1) {
    const field = document.getElementById(fieldId(steps.slice(0, n).join('/')));
    if (field !== null) {
      field.focus();
      field.scrollIntoView({ block: 'center' });
      return;
    }
  }
};

interface AroundProps {
  readonly at: string;
  readonly label: string;
  readonly hint?: string | undefined;
  /** Where it is not what stands at the pointer alone. */
  readonly faults?: readonly Fault[];
  readonly children: ReactNode;
}

/** Label, hint, field, and what is wrong with it. */
export const Around = ({ at, label, hint, faults: told, children }: AroundProps) => {
  const own = useFaultsAt(at);
  const faults = told ?? own;
  const id = fieldId(at);
  return (
    <div className="field">
      <label htmlFor={id}>{label}</label>
      {hint !== undefined && (
        <p className="hint" id={`${id}:hint`}>
          {hint}
        </p>
      )}
      {faults.map((fault) => (
        <p className="field-error" key={fault.detail} id={`${id}:error`}>
          {fault.detail}
        </p>
      ))}
      {children}
    </div>
  );
};

/** Several fields that are one matter; faults of the whole stand at its head. */
export const Group = ({ at, label, hint, children }: AroundProps) => {
  const faults = useFaultsAt(at);
  return (
    <fieldset id={fieldId(at)} tabIndex={-1}>
      <legend>{label}</legend>
      {hint !== undefined && <p className="hint">{hint}</p>}
      {faults.map((fault) => (
        <p className="field-error" key={fault.detail}>
          {fault.detail}
        </p>
      ))}
      <div className="field-grid">{children}</div>
    </fieldset>
  );
};

/** What a field says of itself to those who do not see it. */
export const useDescribed = (at: string, hint: string | undefined) => {
  const faulty = useFaultsAt(at).length > 0;
  const id = fieldId(at);
  const described = [hint !== undefined && `${id}:hint`, faulty && `${id}:error`].filter(Boolean);
  return {
    id,
    'aria-invalid': faulty ? ('true' as const) : undefined,
    'aria-describedby': described.length === 0 ? undefined : described.join(' '),
  };
};
