import { Mark } from '../../look/Mark';
import { OUTCOME_MARKS, OUTCOME_WORDS } from '../../verify/outcome-words';
import type { Stage } from './stages';

/** The stages of a draw run again, in order. */
export const StageList = ({
  stages,
  lastRef,
}: {
  readonly stages: readonly Stage[];
  /** Takes the heading of the last stage, to lead there. */
  readonly lastRef?: (heading: HTMLElement | null) => void;
}) => (
  <ol className="border-t-2 border-ink">
    {stages.map((stage, i) => (
      <li
        key={stage.key}
        className="border-b border-hair py-3"
        data-stage={stage.key}
        data-outcome={stage.outcome}
      >
        <h4
          className="flex items-start gap-3"
          tabIndex={-1}
          {...(i === stages.length - 1 && lastRef !== undefined && { ref: lastRef })}
        >
          <Mark status={OUTCOME_MARKS[stage.outcome]} title={OUTCOME_WORDS[stage.outcome]} />
          <span>
            {i + 1}. {stage.title}
          </span>
        </h4>
        <dl className="mt-2 ml-10">
          {stage.facts.map(({ name, value }) => (
            <div key={name} className="mt-1 md:grid md:grid-cols-[13rem_minmax(0,1fr)] md:gap-5">
              <dt className="note">{name}</dt>
              <dd className={/^[0-9a-f./]{16,}$/.test(value) ? 'num break-all' : ''}>{value}</dd>
            </div>
          ))}
          {stage.doesNotProve !== undefined && (
            <div className="mt-1 md:grid md:grid-cols-[13rem_minmax(0,1fr)] md:gap-5">
              <dt className="note">It does not prove</dt>
              <dd>{stage.doesNotProve}</dd>
            </div>
          )}
        </dl>
      </li>
    ))}
  </ol>
);
