interface Problem {
  /** Id of the field at fault; without one the sentence stands alone. */
  readonly field?: string;
  readonly message: string;
}

interface ProblemSummaryProps {
  readonly problems: readonly Problem[];
  readonly title?: string;
}

/** Stands at the top of a form that was sent back; each line leads to its field. Nothing when all is well. */
export const ProblemSummary = ({ problems, title = 'Not saved yet' }: ProblemSummaryProps) =>
  problems.length === 0 ? null : (
    <div className="problems" role="alert" aria-labelledby="problems-title" tabIndex={-1}>
      <h2 id="problems-title">{title}</h2>
      <ul>
        {problems.map((problem) => (
          <li key={`${problem.field ?? ''}:${problem.message}`}>
            {problem.field === undefined ? (
              problem.message
            ) : (
              <a href={`#${problem.field}`}>{problem.message}</a>
            )}
          </li>
        ))}
      </ul>
    </div>
  );
