import type { Step } from '@/domain/ledger/verify/step';
import { Mark } from '../look/Mark';
import { OUTCOME_MARKS, OUTCOME_WORDS } from './outcome-words';

/** What was looked at, one by one: what was found, what that proves, and what it does not. */
export const StepList = ({ steps }: { readonly steps: readonly Step[] }) => (
  <ol className="rows stack">
    {steps.map((step) => (
      <li key={`${step.id} ${step.found}`} data-step={step.id} data-outcome={step.outcome}>
        <p className="status">
          <Mark status={OUTCOME_MARKS[step.outcome]} />
          <span>
            <strong>{OUTCOME_WORDS[step.outcome]}</strong> {step.checked}
          </span>
        </p>
        <dl className="gap-x-5 break-words md:grid md:grid-cols-[9rem_minmax(0,1fr)]">
          <dt>Found</dt>
          <dd className="break-all">{step.found}</dd>
          <dt>Proves</dt>
          <dd>{step.proves}</dd>
          <dt>Does not prove</dt>
          <dd>{step.doesNotProve}</dd>
        </dl>
      </li>
    ))}
  </ol>
);
