import type { ClauseResult, PositionResult, State } from '@/domain/rulebook/clause-result';
import { Mark } from '../look/Mark';
import { markOfState, wordOfState } from '../look/status';

const WORTH_NAMING: readonly State[] = ['outside', 'does-not-comply', 'too-close'];

const named = (result: ClauseResult): readonly PositionResult[] =>
  result.perPosition.length < 2
    ? []
    : result.perPosition.filter((row) => WORTH_NAMING.includes(row.state));

/** Every clause that can be held against what is declared, with its mark, its word and its cautions. */
export const CheckList = ({ results }: { readonly results: readonly ClauseResult[] }) => (
  <ul>
    {results.map((result) => (
      <li className="flex gap-3 border-b border-hair py-3" key={result.clause}>
        <Mark status={markOfState(result.state)} title={wordOfState(result.state)} />
        <div className="min-w-0 flex-1">
          <strong className="num">{result.clause}</strong> {result.heading}
          {result.advisory && ' (advisory)'}: {result.sentence}
          {result.limit !== undefined && result.perPosition.length > 1 && (
            <span className="text-ink-2"> {result.limit}.</span>
          )}
          {named(result).length > 0 && (
            <ul>
              {named(result).map((row) => (
                <li key={row.position}>{row.sentence}</li>
              ))}
            </ul>
          )}
          {result.cautions.map((caution) => (
            <p key={caution} className="mt-1 font-semibold">
              {caution}
            </p>
          ))}
        </div>
      </li>
    ))}
  </ul>
);
