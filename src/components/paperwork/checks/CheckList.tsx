import { remediesInClass } from '@/domain/inspection/remedies-in-class';
import type { ClauseResult, PositionResult, State } from '@/domain/rulebook/clause-result';
import type { Facts } from '@/domain/rulebook/evaluate/facts';
import type { RulesInForce } from '@/domain/rulebook/rules-in-force';
import { Budgets } from '../../finding/Budgets';
import { Remedies } from '../../finding/Remedies';
import { Mark } from '../../look/Mark';
import { markOfState, wordOfState } from '../../look/status';
import { DeclaredStrips } from './DeclaredStrips';

const WORTH_NAMING: readonly State[] = ['outside', 'does-not-comply', 'too-close'];

const named = (result: ClauseResult): readonly PositionResult[] =>
  result.perPosition.length < 2
    ? []
    : result.perPosition.filter((row) => WORTH_NAMING.includes(row.state));

interface CheckListProps {
  readonly results: readonly ClauseResult[];
  readonly rules: Pick<RulesInForce, 'clauses'>;
  /** What is declared so far. */
  readonly facts: Pick<Facts, 'numbers'>;
}

/** Every clause that can be held against what is declared, with its mark, its word and its cautions. */
export const CheckList = ({ results, rules, facts }: CheckListProps) => (
  <>
    <details>
      <summary>Where ± U comes from in this check</summary>
      <p>
        A declaration does not say by which gauge a value was measured. For lifters and bores this
        check takes a micrometer and a dial bore gauge of 0.0001 in as they usually are; other
        values stand without U. An inspector’s gauges have their own, and what he measures counts.
      </p>
    </details>
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
            {rules.clauses
              .filter(({ number }) => number === result.clause)
              .map((clause) => (
                <div key={clause.number}>
                  <DeclaredStrips clause={clause} result={result} />
                  <Budgets results={result.perPosition} />
                  <Remedies
                    bores={remediesInClass(clause, { clauses: rules.clauses, results }, facts)}
                  />
                </div>
              ))}
          </div>
        </li>
      ))}
    </ul>
  </>
);
